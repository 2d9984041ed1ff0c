import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import type { MethodName, OptionKind, PricedExercise, Verdict } from '@/pricing/contract';
import type { Route } from '@/shared/contracts/pricing';
import { sequelize } from '../database';
import { Underlying } from './underlying';
import { User } from './user';

/** A quote as the server priced it. Rows are added only. Booked amounts are decimal text. */
export class Quote extends Model<InferAttributes<Quote>, InferCreationAttributes<Quote>> {
  declare id: CreationOptional<string>;
  declare deskId: string;
  declare number: string;
  declare underlyingId: string;
  declare direction: 'buy' | 'sell';
  declare quantity: string;
  declare contractSize: string;
  declare kind: OptionKind;
  declare exercise: PricedExercise;
  declare strike: string;
  declare expiryDate: string;
  declare expiryAt: Date;
  declare expiryYears: number;
  declare spot: number;
  declare rate: number;
  declare yield: number | null;
  declare volatility: number;
  declare snapshotId: string | null;
  declare pricedAt: Date;
  declare value: number;
  declare errorEstimate: number | null;
  declare total: string;
  declare tolerance: number;
  declare verdict: Verdict;
  declare refuted: boolean;
  declare primaryRoute: MethodName;
  declare routes: Route[];
  declare engine: string;
  declare indicativeValue: number;
  declare note: string;
  declare createdById: string;
  declare createdAt: CreationOptional<Date>;
  declare underlying?: NonAttribute<Underlying>;
  declare createdBy?: NonAttribute<User>;
}

/** Made anew for each column: Sequelize writes the column's name into what it is given. */
const id = () => ({ type: DataTypes.UUID, allowNull: false });
const text = () => ({ type: DataTypes.TEXT, allowNull: false });
const decimal = () => ({ type: DataTypes.DECIMAL, allowNull: false });
const double = () => ({ type: DataTypes.DOUBLE, allowNull: false });
const instant = () => ({ type: DataTypes.DATE(3), allowNull: false });

Quote.init(
  {
    id: { ...id(), primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    deskId: id(),
    number: text(),
    underlyingId: id(),
    direction: text(),
    quantity: decimal(),
    contractSize: decimal(),
    kind: text(),
    exercise: text(),
    strike: decimal(),
    expiryDate: { type: DataTypes.DATEONLY, allowNull: false },
    expiryAt: instant(),
    expiryYears: double(),
    spot: double(),
    rate: double(),
    yield: { type: DataTypes.DOUBLE },
    volatility: double(),
    snapshotId: { type: DataTypes.UUID },
    pricedAt: instant(),
    value: double(),
    errorEstimate: { type: DataTypes.DOUBLE },
    total: decimal(),
    tolerance: double(),
    verdict: text(),
    refuted: { type: DataTypes.BOOLEAN, allowNull: false },
    primaryRoute: text(),
    routes: { type: DataTypes.JSONB, allowNull: false },
    engine: text(),
    indicativeValue: double(),
    note: text(),
    createdById: id(),
    createdAt: { ...instant(), defaultValue: DataTypes.NOW },
  },
  { sequelize, tableName: 'quotes' },
);
Quote.belongsTo(Underlying, { as: 'underlying', foreignKey: 'underlyingId' });
Quote.belongsTo(User, { as: 'createdBy', foreignKey: 'createdById' });
