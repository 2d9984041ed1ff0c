import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import type { BreakKind } from '@/shared/contracts/chain';
import { sequelize } from '../database';
import { User } from './user';

/** One walk along a chain: how far it has come and the first thing that it found wrong. */
export class ChainVerification extends Model<
  InferAttributes<ChainVerification>,
  InferCreationAttributes<ChainVerification>
> {
  declare id: CreationOptional<string>;
  declare deskId: string;
  declare chain: string;
  declare status: CreationOptional<'queued' | 'running' | 'finished'>;
  /** Place and hash that whoever asked had kept themselves. Bigints are text. */
  declare heldPosition: string | null;
  declare heldHash: string | null;
  declare total: CreationOptional<string>;
  declare checked: CreationOptional<string>;
  declare anchors: CreationOptional<string>;
  declare breakKind: CreationOptional<BreakKind | null>;
  declare breakPosition: CreationOptional<string | null>;
  declare startedById: string;
  declare startedAt: CreationOptional<Date>;
  declare finishedAt: CreationOptional<Date | null>;
  declare startedBy?: NonAttribute<User>;
}

/** Made afresh for each: the library writes the column's name into what it is given. */
const count = () => ({ type: DataTypes.BIGINT, allowNull: false, defaultValue: '0' });

ChainVerification.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    deskId: { type: DataTypes.UUID, allowNull: false },
    chain: { type: DataTypes.TEXT, allowNull: false },
    status: { type: DataTypes.TEXT, allowNull: false, defaultValue: 'queued' },
    heldPosition: { type: DataTypes.BIGINT },
    heldHash: { type: DataTypes.TEXT },
    total: count(),
    checked: count(),
    anchors: count(),
    breakKind: { type: DataTypes.TEXT },
    breakPosition: { type: DataTypes.BIGINT },
    startedById: { type: DataTypes.UUID, allowNull: false },
    startedAt: { type: DataTypes.DATE(3), allowNull: false, defaultValue: DataTypes.NOW },
    finishedAt: { type: DataTypes.DATE(3) },
  },
  { sequelize, tableName: 'chain_verifications' },
);
ChainVerification.belongsTo(User, { as: 'startedBy', foreignKey: 'startedById' });
