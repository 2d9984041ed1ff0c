import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '../database';

export class Desk extends Model<InferAttributes<Desk>, InferCreationAttributes<Desk>> {
  declare id: CreationOptional<string>;
  declare name: string;
  /** IANA name. The desk's "today" is the day there. */
  declare timeZone: string;
  /** Local time of day at which options expire, HH:MM. */
  declare expiryCutoff: string;
  /** Counted on under the row's lock, so that quotes are numbered without gaps. */
  declare lastQuoteNumber: CreationOptional<number>;
  /** Counts the desk's trades in the same way. */
  declare lastTradeNumber: CreationOptional<number>;
  /** Counts the desk's valuation runs in the same way. */
  declare lastRunNumber: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
}

Desk.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    name: { type: DataTypes.TEXT, allowNull: false },
    timeZone: { type: DataTypes.TEXT, allowNull: false },
    expiryCutoff: { type: DataTypes.TEXT, allowNull: false },
    lastQuoteNumber: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
    lastTradeNumber: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
    lastRunNumber: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
    createdAt: { type: DataTypes.DATE(3), allowNull: false, defaultValue: DataTypes.NOW },
  },
  { sequelize, tableName: 'desks' },
);
