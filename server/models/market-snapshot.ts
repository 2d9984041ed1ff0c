import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import type { SnapshotSource, SnapshotStatus } from '@/shared/contracts/market-data';
import { sequelize } from '../database';
import { MarketQuote } from './market-quote';
import { User } from './user';

/** The official close of a desk on one day, approved by someone who had no hand in it. */
export class MarketSnapshot extends Model<
  InferAttributes<MarketSnapshot>,
  InferCreationAttributes<MarketSnapshot>
> {
  declare id: CreationOptional<string>;
  declare deskId: string;
  declare date: string;
  declare status: CreationOptional<SnapshotStatus>;
  declare version: CreationOptional<number>;
  declare source: CreationOptional<SnapshotSource>;
  declare enteredById: string;
  declare enteredAt: CreationOptional<Date>;
  /** Whoever saved the draft after it was entered. */
  declare savedByIds: CreationOptional<string[]>;
  declare savedAt: CreationOptional<Date | null>;
  /** Why an approved close is restated. */
  declare reason: CreationOptional<string | null>;
  declare restatesId: CreationOptional<string | null>;
  declare approvedById: CreationOptional<string | null>;
  declare approvedAt: CreationOptional<Date | null>;
  declare supersededById: CreationOptional<string | null>;
  declare quotes?: NonAttribute<MarketQuote[]>;
  declare enteredBy?: NonAttribute<User>;
  declare approvedBy?: NonAttribute<User | null>;
}

MarketSnapshot.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    deskId: { type: DataTypes.UUID, allowNull: false },
    date: { type: DataTypes.DATEONLY, allowNull: false },
    status: { type: DataTypes.TEXT, allowNull: false, defaultValue: 'draft' },
    version: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
    source: { type: DataTypes.TEXT, allowNull: false, defaultValue: 'typed' },
    enteredById: { type: DataTypes.UUID, allowNull: false },
    enteredAt: { type: DataTypes.DATE(3), allowNull: false, defaultValue: DataTypes.NOW },
    savedByIds: { type: DataTypes.ARRAY(DataTypes.UUID), allowNull: false, defaultValue: [] },
    savedAt: { type: DataTypes.DATE(3) },
    reason: { type: DataTypes.TEXT },
    restatesId: { type: DataTypes.UUID },
    approvedById: { type: DataTypes.UUID },
    approvedAt: { type: DataTypes.DATE(3) },
    supersededById: { type: DataTypes.UUID },
  },
  { sequelize, tableName: 'market_snapshots' },
);
MarketSnapshot.hasMany(MarketQuote, { as: 'quotes', foreignKey: 'snapshotId' });
MarketSnapshot.belongsTo(User, { as: 'enteredBy', foreignKey: 'enteredById' });
MarketSnapshot.belongsTo(User, { as: 'approvedBy', foreignKey: 'approvedById' });
