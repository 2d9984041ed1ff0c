import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import type { RunStatus } from '@/shared/contracts/runs';
import { sequelize } from '../database';
import { PricingPolicy } from './pricing-policy';
import { User } from './user';

/** A run over the live trades of some books; what it found is in the chain of valuations. */
export class ValuationRun extends Model<
  InferAttributes<ValuationRun>,
  InferCreationAttributes<ValuationRun>
> {
  declare id: CreationOptional<string>;
  declare deskId: string;
  declare ordinal: number;
  /** Made of the ordinal by the database. */
  declare readonly number: CreationOptional<string>;
  declare snapshotId: string;
  declare snapshotDate: string;
  declare policyId: string;
  /** One instant for all of its values. */
  declare valuedAt: Date;
  declare engine: string;
  declare status: CreationOptional<RunStatus>;
  declare version: CreationOptional<number>;
  declare rerunOfId: string | null;
  declare total: number;
  declare done: CreationOptional<number>;
  declare leftOut: number;
  declare agree: CreationOptional<number>;
  declare wide: CreationOptional<number>;
  declare disagree: CreationOptional<number>;
  declare oneRoute: CreationOptional<number>;
  declare failed: CreationOptional<number>;
  declare refuted: CreationOptional<number>;
  /** By currency, decimal text; null until it has finished. */
  declare totals: CreationOptional<Record<string, string> | null>;
  declare startedById: string;
  declare startedAt: CreationOptional<Date>;
  declare finishedAt: CreationOptional<Date | null>;
  declare cancelledById: CreationOptional<string | null>;
  declare cancelledAt: CreationOptional<Date | null>;
  declare signedOffById: CreationOptional<string | null>;
  declare signedOffAt: CreationOptional<Date | null>;
  declare signOffComment: CreationOptional<string | null>;
  declare policy?: NonAttribute<PricingPolicy>;
  declare rerunOf?: NonAttribute<ValuationRun | null>;
  declare startedBy?: NonAttribute<User>;
  declare cancelledBy?: NonAttribute<User | null>;
  declare signedOffBy?: NonAttribute<User | null>;
}

/** Made anew for each column: Sequelize writes the column's name into what it is given. */
const id = () => ({ type: DataTypes.UUID, allowNull: false });
const text = () => ({ type: DataTypes.TEXT, allowNull: false });
const instant = () => ({ type: DataTypes.DATE(3) });
const count = () => ({ type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 });

ValuationRun.init(
  {
    id: { ...id(), primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    deskId: id(),
    ordinal: { type: DataTypes.INTEGER, allowNull: false },
    number: { type: DataTypes.TEXT },
    snapshotId: id(),
    snapshotDate: { type: DataTypes.DATEONLY, allowNull: false },
    policyId: id(),
    valuedAt: { ...instant(), allowNull: false },
    engine: text(),
    status: { ...text(), defaultValue: 'queued' },
    version: count(),
    rerunOfId: { type: DataTypes.UUID },
    total: { type: DataTypes.INTEGER, allowNull: false },
    done: count(),
    leftOut: { type: DataTypes.INTEGER, allowNull: false },
    agree: count(),
    wide: count(),
    disagree: count(),
    oneRoute: count(),
    failed: count(),
    refuted: count(),
    totals: { type: DataTypes.JSONB },
    startedById: id(),
    startedAt: { ...instant(), allowNull: false, defaultValue: DataTypes.NOW },
    finishedAt: instant(),
    cancelledById: { type: DataTypes.UUID },
    cancelledAt: instant(),
    signedOffById: { type: DataTypes.UUID },
    signedOffAt: instant(),
    signOffComment: { type: DataTypes.TEXT },
  },
  { sequelize, tableName: 'valuation_runs' },
);
ValuationRun.belongsTo(PricingPolicy, { as: 'policy', foreignKey: 'policyId' });
ValuationRun.belongsTo(ValuationRun, { as: 'rerunOf', foreignKey: 'rerunOfId' });
ValuationRun.belongsTo(User, { as: 'startedBy', foreignKey: 'startedById' });
ValuationRun.belongsTo(User, { as: 'cancelledBy', foreignKey: 'cancelledById' });
ValuationRun.belongsTo(User, { as: 'signedOffBy', foreignKey: 'signedOffById' });
