import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import { sequelize } from '../database';
import { MarketQuote } from './market-quote';

/** The official close of a desk on one day, approved by someone other than who entered it. */
export class MarketSnapshot extends Model<
  InferAttributes<MarketSnapshot>,
  InferCreationAttributes<MarketSnapshot>
> {
  declare id: CreationOptional<string>;
  declare deskId: string;
  declare date: string;
  declare status: CreationOptional<'draft' | 'approved' | 'superseded'>;
  declare enteredById: string;
  declare enteredAt: CreationOptional<Date>;
  declare approvedById: CreationOptional<string | null>;
  declare approvedAt: CreationOptional<Date | null>;
  declare quotes?: NonAttribute<MarketQuote[]>;
}

MarketSnapshot.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    deskId: { type: DataTypes.UUID, allowNull: false },
    date: { type: DataTypes.DATEONLY, allowNull: false },
    status: { type: DataTypes.TEXT, allowNull: false, defaultValue: 'draft' },
    enteredById: { type: DataTypes.UUID, allowNull: false },
    enteredAt: { type: DataTypes.DATE(3), allowNull: false, defaultValue: DataTypes.NOW },
    approvedById: { type: DataTypes.UUID },
    approvedAt: { type: DataTypes.DATE(3) },
  },
  { sequelize, tableName: 'market_snapshots' },
);
MarketSnapshot.hasMany(MarketQuote, { as: 'quotes', foreignKey: 'snapshotId' });
