import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import type { DeskRole } from '@/shared/permissions';
import { sequelize } from '../database';
import { Desk } from './desk';
import { User } from './user';

export class Membership extends Model<
  InferAttributes<Membership>,
  InferCreationAttributes<Membership>
> {
  declare id: CreationOptional<string>;
  declare deskId: string;
  declare userId: string;
  declare role: DeskRole;
  declare memberSince: string;
  declare suspendedAt: CreationOptional<Date | null>;
  declare suspensionReason: CreationOptional<string | null>;
  /** Counts every change of what this member may do, single grants included. */
  declare version: CreationOptional<number>;
  declare user?: NonAttribute<User>;
  declare desk?: NonAttribute<Desk>;
}

Membership.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    deskId: { type: DataTypes.UUID, allowNull: false },
    userId: { type: DataTypes.UUID, allowNull: false },
    role: { type: DataTypes.TEXT, allowNull: false },
    memberSince: { type: DataTypes.DATEONLY, allowNull: false },
    suspendedAt: { type: DataTypes.DATE(3) },
    suspensionReason: { type: DataTypes.TEXT },
    version: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
  },
  { sequelize, tableName: 'memberships' },
);
Membership.belongsTo(User, { as: 'user', foreignKey: 'userId' });
Membership.belongsTo(Desk, { as: 'desk', foreignKey: 'deskId' });
