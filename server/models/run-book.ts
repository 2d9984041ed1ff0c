import { DataTypes, Model, type InferAttributes, type InferCreationAttributes } from 'sequelize';
import { sequelize } from '../database';

/** A book of a run. It follows by itself whether the run is active; a book is in one such run. */
export class RunBook extends Model<InferAttributes<RunBook>, InferCreationAttributes<RunBook>> {
  declare runId: string;
  declare bookId: string;
  declare deskId: string;
  declare isActive: boolean;
  /** How many trades of the book are in the run. */
  declare trades: number;
}

const id = () => ({ type: DataTypes.UUID, allowNull: false });

RunBook.init(
  {
    runId: { ...id(), primaryKey: true },
    bookId: { ...id(), primaryKey: true },
    deskId: id(),
    isActive: { type: DataTypes.BOOLEAN, allowNull: false },
    trades: { type: DataTypes.INTEGER, allowNull: false },
  },
  { sequelize, tableName: 'run_books' },
);
