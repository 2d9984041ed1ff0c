import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import type { Verdict } from '@/pricing/contract';
import type { LastValuation, TradeEnd } from '@/shared/contracts/trades';
import type { TradeStatus } from '@/shared/trade-moves';
import { sequelize } from '../database';
import { Book } from './book';
import { TradeVersion } from './trade-version';
import { Underlying } from './underlying';
import { User } from './user';

/** Where a trade stands, and what it was last worth. Booked amounts are decimal text. */
export class Trade extends Model<InferAttributes<Trade>, InferCreationAttributes<Trade>> {
  declare id: CreationOptional<string>;
  declare deskId: string;
  declare bookId: string;
  /** Counts the trades of a desk; the number is made of it by the table. */
  declare ordinal: number;
  declare readonly number: CreationOptional<string>;
  declare status: TradeStatus;
  declare liveVersionId: CreationOptional<string | null>;
  declare latestVersionId: string;
  /** Counts the changes made by people; a run's values are none. */
  declare version: CreationOptional<number>;
  declare underlyingId: string;
  /** Of the terms in force, or of those proposed while none are. */
  declare expiryAt: Date;
  declare proposedById: string;
  declare proposedAt: CreationOptional<Date>;
  declare endOutcome: CreationOptional<TradeEnd['outcome'] | null>;
  declare endDate: CreationOptional<string | null>;
  declare endAmount: CreationOptional<string | null>;
  declare endCurrency: CreationOptional<string | null>;
  declare lastRunId: CreationOptional<string | null>;
  declare lastSnapshotDate: CreationOptional<string | null>;
  declare lastValue: CreationOptional<number | null>;
  declare lastError: CreationOptional<number | null>;
  declare lastVerdict: CreationOptional<Verdict | null>;
  declare lastRefuted: CreationOptional<boolean | null>;
  declare lastTotal: CreationOptional<string | null>;
  declare lastStrip: CreationOptional<LastValuation['strip'] | null>;
  declare lastTolerance: CreationOptional<number | null>;
  declare previousValue: CreationOptional<number | null>;
  declare readonly valueChange: CreationOptional<number | null>;
  declare book?: NonAttribute<Book>;
  declare underlying?: NonAttribute<Underlying>;
  declare proposedBy?: NonAttribute<User>;
  declare liveVersion?: NonAttribute<TradeVersion | null>;
  declare latestVersion?: NonAttribute<TradeVersion>;
  declare versions?: NonAttribute<TradeVersion[]>;
}

/** Made anew for each column: Sequelize writes the column's name into what it is given. */
const id = () => ({ type: DataTypes.UUID, allowNull: false });
const instant = () => ({ type: DataTypes.DATE(3), allowNull: false });
const double = () => ({ type: DataTypes.DOUBLE });
const text = () => ({ type: DataTypes.TEXT });

Trade.init(
  {
    id: { ...id(), primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    deskId: id(),
    bookId: id(),
    ordinal: { type: DataTypes.INTEGER, allowNull: false },
    number: text(),
    status: { ...text(), allowNull: false },
    liveVersionId: { type: DataTypes.UUID },
    latestVersionId: id(),
    version: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
    underlyingId: id(),
    expiryAt: instant(),
    proposedById: id(),
    proposedAt: { ...instant(), defaultValue: DataTypes.NOW },
    endOutcome: text(),
    endDate: { type: DataTypes.DATEONLY },
    endAmount: { type: DataTypes.DECIMAL },
    endCurrency: text(),
    lastRunId: { type: DataTypes.UUID },
    lastSnapshotDate: { type: DataTypes.DATEONLY },
    lastValue: double(),
    lastError: double(),
    lastVerdict: text(),
    lastRefuted: { type: DataTypes.BOOLEAN },
    lastTotal: { type: DataTypes.DECIMAL },
    lastStrip: { type: DataTypes.JSONB },
    lastTolerance: double(),
    previousValue: double(),
    valueChange: double(),
  },
  { sequelize, tableName: 'trades' },
);
Trade.belongsTo(Book, { as: 'book', foreignKey: 'bookId' });
Trade.belongsTo(Underlying, { as: 'underlying', foreignKey: 'underlyingId' });
Trade.belongsTo(User, { as: 'proposedBy', foreignKey: 'proposedById' });
Trade.belongsTo(TradeVersion, { as: 'liveVersion', foreignKey: 'liveVersionId' });
Trade.belongsTo(TradeVersion, { as: 'latestVersion', foreignKey: 'latestVersionId' });
Trade.hasMany(TradeVersion, { as: 'versions', foreignKey: 'tradeId' });
