import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '../database';

/** The close of one underlying. A future has no yield of its own: null. */
export class MarketQuote extends Model<
  InferAttributes<MarketQuote>,
  InferCreationAttributes<MarketQuote>
> {
  declare snapshotId: string;
  declare underlyingId: string;
  declare deskId: string;
  declare spot: number;
  declare rate: number;
  declare yield: CreationOptional<number | null>;
  declare volatility: number;
}

MarketQuote.init(
  {
    snapshotId: { type: DataTypes.UUID, primaryKey: true },
    underlyingId: { type: DataTypes.UUID, primaryKey: true },
    deskId: { type: DataTypes.UUID, allowNull: false },
    spot: { type: DataTypes.DOUBLE, allowNull: false },
    rate: { type: DataTypes.DOUBLE, allowNull: false },
    yield: { type: DataTypes.DOUBLE },
    volatility: { type: DataTypes.DOUBLE, allowNull: false },
  },
  { sequelize, tableName: 'market_quotes' },
);
