import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import type { Contract, LadderStep, Market, MethodName, StudyReference } from '@/pricing/contract';
import type { StudyStatus, StudySummary, StudyTerms } from '@/shared/contracts/studies';
import { sequelize } from '../database';
import { Quote } from './quote';
import { Trade } from './trade';
import { Underlying } from './underlying';
import { User } from './user';

/** What one method is taken through. */
export type PlannedLadder = { name: MethodName; theoreticalOrder: number; steps: LadderStep[] };

export class Study extends Model<InferAttributes<Study>, InferCreationAttributes<Study>> {
  declare id: CreationOptional<string>;
  declare deskId: string;
  declare ordinal: number;
  /** Made of the ordinal by the database. */
  declare number: CreationOptional<string>;
  declare source: 'trade' | 'quote' | 'free';
  declare quoteId: string | null;
  declare tradeId: CreationOptional<string | null>;
  declare tradeVersionId: CreationOptional<string | null>;
  declare underlyingId: string;
  declare terms: StudyTerms;
  declare request: { contract: Contract; market: Market };
  declare reference: StudyReference;
  declare ladders: PlannedLadder[];
  /** Kept when the last row is in, so that lists need no rows. */
  declare orders: CreationOptional<StudySummary['orders'] | null>;
  declare engine: string;
  declare status: CreationOptional<StudyStatus>;
  declare total: number;
  declare done: CreationOptional<number>;
  declare version: CreationOptional<number>;
  declare startedById: string;
  declare createdAt: CreationOptional<Date>;
  declare finishedAt: CreationOptional<Date | null>;
  declare decidedById: CreationOptional<string | null>;
  declare decidedAt: CreationOptional<Date | null>;
  declare decisionComment: CreationOptional<string | null>;
  declare quote?: NonAttribute<Quote | null>;
  declare trade?: NonAttribute<Trade | null>;
  declare underlying?: NonAttribute<Underlying>;
  declare startedBy?: NonAttribute<User>;
  declare decidedBy?: NonAttribute<User | null>;
}

/** Made anew for each column: Sequelize writes the column's name into what it is given. */
const id = () => ({ type: DataTypes.UUID, allowNull: false });
const text = () => ({ type: DataTypes.TEXT, allowNull: false });
const count = () => ({ type: DataTypes.INTEGER, allowNull: false });
const json = () => ({ type: DataTypes.JSONB, allowNull: false });

Study.init(
  {
    id: { ...id(), primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    deskId: id(),
    ordinal: count(),
    number: { type: DataTypes.TEXT },
    source: text(),
    quoteId: { type: DataTypes.UUID },
    tradeId: { type: DataTypes.UUID },
    tradeVersionId: { type: DataTypes.UUID },
    underlyingId: id(),
    terms: json(),
    request: json(),
    reference: json(),
    ladders: json(),
    orders: { type: DataTypes.JSONB },
    engine: text(),
    status: { ...text(), defaultValue: 'queued' },
    total: count(),
    done: { ...count(), defaultValue: 0 },
    version: { ...count(), defaultValue: 0 },
    startedById: id(),
    createdAt: { type: DataTypes.DATE(3), allowNull: false, defaultValue: DataTypes.NOW },
    finishedAt: { type: DataTypes.DATE(3) },
    decidedById: { type: DataTypes.UUID },
    decidedAt: { type: DataTypes.DATE(3) },
    decisionComment: { type: DataTypes.TEXT },
  },
  { sequelize, tableName: 'studies' },
);
Study.belongsTo(Quote, { as: 'quote', foreignKey: 'quoteId' });
Study.belongsTo(Trade, { as: 'trade', foreignKey: 'tradeId' });
Study.belongsTo(Underlying, { as: 'underlying', foreignKey: 'underlyingId' });
Study.belongsTo(User, { as: 'startedBy', foreignKey: 'startedById' });
Study.belongsTo(User, { as: 'decidedBy', foreignKey: 'decidedById' });
