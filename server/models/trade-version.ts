import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import type { OptionKind, PricedExercise } from '@/pricing/contract';
import type { TradeVersion as TradeVersionOnTheWire } from '@/shared/contracts/trades';
import { sequelize } from '../database';
import { User } from './user';

/** What was agreed, as one proposal or amendment puts it. Amounts are decimal text. */
export class TradeVersion extends Model<
  InferAttributes<TradeVersion>,
  InferCreationAttributes<TradeVersion>
> {
  declare id: CreationOptional<string>;
  declare deskId: string;
  declare tradeId: string;
  declare number: number;
  declare state: CreationOptional<TradeVersionOnTheWire['state']>;
  declare underlyingId: string;
  declare direction: 'buy' | 'sell';
  declare quantity: string;
  declare contractSize: string;
  declare kind: OptionKind;
  declare exercise: PricedExercise;
  declare strike: string;
  declare expiryDate: string;
  declare expiryAt: Date;
  declare premiumAmount: string;
  declare premiumCurrency: string;
  declare premiumDate: string;
  declare counterparty: string;
  declare tradedAt: Date;
  declare note: string;
  declare quoteId: CreationOptional<string | null>;
  declare amendmentReason: CreationOptional<string | null>;
  declare proposedById: string;
  declare proposedAt: CreationOptional<Date>;
  declare decidedById: CreationOptional<string | null>;
  declare decidedAt: CreationOptional<Date | null>;
  declare decisionReason: CreationOptional<string | null>;
  declare proposedBy?: NonAttribute<User>;
  declare decidedBy?: NonAttribute<User | null>;
}

/** Made anew for each column: Sequelize writes the column's name into what it is given. */
const id = () => ({ type: DataTypes.UUID, allowNull: false });
const text = () => ({ type: DataTypes.TEXT, allowNull: false });
const decimal = () => ({ type: DataTypes.DECIMAL, allowNull: false });
const day = () => ({ type: DataTypes.DATEONLY, allowNull: false });
const instant = () => ({ type: DataTypes.DATE(3), allowNull: false });

TradeVersion.init(
  {
    id: { ...id(), primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    deskId: id(),
    tradeId: id(),
    number: { type: DataTypes.INTEGER, allowNull: false },
    state: { ...text(), defaultValue: 'proposed' },
    underlyingId: id(),
    direction: text(),
    quantity: decimal(),
    contractSize: decimal(),
    kind: text(),
    exercise: text(),
    strike: decimal(),
    expiryDate: day(),
    expiryAt: instant(),
    premiumAmount: decimal(),
    premiumCurrency: text(),
    premiumDate: day(),
    counterparty: text(),
    tradedAt: instant(),
    note: text(),
    quoteId: { type: DataTypes.UUID },
    amendmentReason: { type: DataTypes.TEXT },
    proposedById: id(),
    proposedAt: { ...instant(), defaultValue: DataTypes.NOW },
    decidedById: { type: DataTypes.UUID },
    decidedAt: { type: DataTypes.DATE(3) },
    decisionReason: { type: DataTypes.TEXT },
  },
  { sequelize, tableName: 'trade_versions' },
);
TradeVersion.belongsTo(User, { as: 'proposedBy', foreignKey: 'proposedById' });
TradeVersion.belongsTo(User, { as: 'decidedBy', foreignKey: 'decidedById' });
