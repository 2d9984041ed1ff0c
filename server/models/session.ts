import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import { sequelize } from '../database';
import { User } from './user';

/** One sign-in. Of the refresh tokens that it was given in turn, only the newest one's hash is kept. */
export class Session extends Model<InferAttributes<Session>, InferCreationAttributes<Session>> {
  declare id: CreationOptional<string>;
  declare userId: string;
  declare refreshHash: string;
  /** When the password was last given. */
  declare steppedUpAt: Date;
  declare createdAt: Date;
  declare rotatedAt: Date;
  declare expiresAt: Date;
  declare endedAt: CreationOptional<Date | null>;
  declare endCause: CreationOptional<'signed-out' | 'token-reused' | null>;
  declare user?: NonAttribute<User>;
}

Session.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    userId: { type: DataTypes.UUID, allowNull: false },
    refreshHash: { type: DataTypes.TEXT, allowNull: false },
    steppedUpAt: { type: DataTypes.DATE(3), allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    rotatedAt: { type: DataTypes.DATE(3), allowNull: false },
    expiresAt: { type: DataTypes.DATE(3), allowNull: false },
    endedAt: { type: DataTypes.DATE(3) },
    endCause: { type: DataTypes.TEXT },
  },
  { sequelize, tableName: 'sessions' },
);
Session.belongsTo(User, { as: 'user', foreignKey: 'userId' });
