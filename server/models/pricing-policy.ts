import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import type { PolicyMethod, PolicySizes } from '@/shared/contracts/policies';
import { sequelize } from '../database';
import { User } from './user';

/** How a desk prices: routes, how far they refine, and how far they may lie apart. */
export class PricingPolicy extends Model<
  InferAttributes<PricingPolicy>,
  InferCreationAttributes<PricingPolicy>
> {
  declare id: CreationOptional<string>;
  declare deskId: string;
  declare number: number;
  declare status: CreationOptional<'draft' | 'approved' | 'superseded'>;
  declare version: CreationOptional<number>;
  declare primaryEuropean: PolicyMethod;
  declare checkEuropean: PolicyMethod;
  declare primaryAmerican: PolicyMethod;
  declare checkAmerican: PolicyMethod;
  /** Sizes by method; null where routes refine to a share of the tolerance instead. */
  declare sizes: PolicySizes | null;
  declare toleranceShare: number | null;
  /** By underlying, in its quote currency per unit. */
  declare unitTolerance: Record<string, number>;
  /** By currency, decimal text: for a whole position. */
  declare moneyTolerance: Record<string, string>;
  declare reason: string;
  declare authorId: string;
  declare authoredAt: CreationOptional<Date>;
  /** Whoever saved the draft after it was written. */
  declare savedByIds: CreationOptional<string[]>;
  declare savedAt: CreationOptional<Date | null>;
  declare approvedById: CreationOptional<string | null>;
  declare approvedAt: CreationOptional<Date | null>;
  declare supersededById: CreationOptional<string | null>;
  declare author?: NonAttribute<User>;
  declare approvedBy?: NonAttribute<User | null>;
}

/** Made anew for each column: Sequelize writes the column's name into what it is given. */
const text = () => ({ type: DataTypes.TEXT, allowNull: false });

PricingPolicy.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    deskId: { type: DataTypes.UUID, allowNull: false },
    number: { type: DataTypes.INTEGER, allowNull: false },
    status: { ...text(), defaultValue: 'draft' },
    version: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
    primaryEuropean: text(),
    checkEuropean: text(),
    primaryAmerican: text(),
    checkAmerican: text(),
    sizes: { type: DataTypes.JSONB },
    toleranceShare: { type: DataTypes.DOUBLE },
    unitTolerance: { type: DataTypes.JSONB, allowNull: false },
    moneyTolerance: { type: DataTypes.JSONB, allowNull: false },
    reason: text(),
    authorId: { type: DataTypes.UUID, allowNull: false },
    authoredAt: { type: DataTypes.DATE(3), allowNull: false, defaultValue: DataTypes.NOW },
    savedByIds: { type: DataTypes.ARRAY(DataTypes.UUID), allowNull: false, defaultValue: [] },
    savedAt: { type: DataTypes.DATE(3) },
    approvedById: { type: DataTypes.UUID },
    approvedAt: { type: DataTypes.DATE(3) },
    supersededById: { type: DataTypes.UUID },
  },
  { sequelize, tableName: 'pricing_policies' },
);
PricingPolicy.belongsTo(User, { as: 'author', foreignKey: 'authorId' });
PricingPolicy.belongsTo(User, { as: 'approvedBy', foreignKey: 'approvedById' });
