import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import type { Underlying as UnderlyingOnTheWire } from '@/shared/contracts/underlyings';
import { sequelize } from '../database';

export class Underlying extends Model<
  InferAttributes<Underlying>,
  InferCreationAttributes<Underlying>
> {
  declare id: CreationOptional<string>;
  declare deskId: string;
  declare symbol: string;
  declare name: string;
  declare kind: UnderlyingOnTheWire['kind'];
  declare currency: string;
  declare unit: string;
  /** Decimal text. */
  declare contractSize: string;
  declare priceDecimals: number;
  /** In the quote currency per unit. */
  declare tolerance: number;
  declare archivedAt: CreationOptional<Date | null>;
}

Underlying.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    deskId: { type: DataTypes.UUID, allowNull: false },
    symbol: { type: DataTypes.TEXT, allowNull: false },
    name: { type: DataTypes.TEXT, allowNull: false },
    kind: { type: DataTypes.TEXT, allowNull: false },
    currency: { type: DataTypes.TEXT, allowNull: false },
    unit: { type: DataTypes.TEXT, allowNull: false },
    contractSize: { type: DataTypes.DECIMAL, allowNull: false },
    priceDecimals: { type: DataTypes.INTEGER, allowNull: false },
    tolerance: { type: DataTypes.DOUBLE, allowNull: false },
    archivedAt: { type: DataTypes.DATE(3) },
  },
  { sequelize, tableName: 'underlyings' },
);
