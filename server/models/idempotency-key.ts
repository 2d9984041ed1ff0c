import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '../database';

/** What a creating request answered, kept so that the same request sent twice acts once. */
export class IdempotencyKey extends Model<
  InferAttributes<IdempotencyKey>,
  InferCreationAttributes<IdempotencyKey>
> {
  declare userId: string;
  declare endpoint: string;
  declare key: string;
  declare requestHash: string;
  declare answer: unknown;
  declare createdAt: CreationOptional<Date>;
}

IdempotencyKey.init(
  {
    userId: { type: DataTypes.UUID, primaryKey: true },
    endpoint: { type: DataTypes.TEXT, primaryKey: true },
    key: { type: DataTypes.UUID, primaryKey: true },
    requestHash: { type: DataTypes.TEXT, allowNull: false },
    answer: { type: DataTypes.JSONB, allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false, defaultValue: DataTypes.NOW },
  },
  { sequelize, tableName: 'idempotency_keys' },
);
