import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '../database';

/** A head as it was signed. Rows are added only. */
export class ChainAnchor extends Model<
  InferAttributes<ChainAnchor>,
  InferCreationAttributes<ChainAnchor>
> {
  declare id: CreationOptional<string>;
  declare chain: string;
  /** A whole number as text, as the driver gives a bigint. */
  declare position: string;
  declare hash: string;
  declare signedAt: Date;
  declare purpose: 'sign-off' | 'export';
  declare keyId: string;
  declare signature: string;
}

ChainAnchor.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    chain: { type: DataTypes.TEXT, allowNull: false },
    position: { type: DataTypes.BIGINT, allowNull: false },
    hash: { type: DataTypes.TEXT, allowNull: false },
    signedAt: { type: DataTypes.DATE(3), allowNull: false },
    purpose: { type: DataTypes.TEXT, allowNull: false },
    keyId: { type: DataTypes.TEXT, allowNull: false },
    signature: { type: DataTypes.TEXT, allowNull: false },
  },
  { sequelize, tableName: 'chain_anchors' },
);
