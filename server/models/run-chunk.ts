import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '../database';

/** Trades of a run that are valued together: all of them are kept, or none. */
export class RunChunk extends Model<InferAttributes<RunChunk>, InferCreationAttributes<RunChunk>> {
  declare runId: string;
  declare number: number;
  declare tradeVersionIds: string[];
  declare doneAt: CreationOptional<Date | null>;
}

RunChunk.init(
  {
    runId: { type: DataTypes.UUID, allowNull: false, primaryKey: true },
    number: { type: DataTypes.INTEGER, allowNull: false, primaryKey: true },
    tradeVersionIds: { type: DataTypes.ARRAY(DataTypes.UUID), allowNull: false },
    doneAt: { type: DataTypes.DATE(3) },
  },
  { sequelize, tableName: 'run_chunks' },
);
