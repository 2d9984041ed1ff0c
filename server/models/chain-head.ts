import { DataTypes, Model, type InferAttributes } from 'sequelize';
import { sequelize } from '../database';

/** Where a chain ends. Written by the database's own `append` only. */
export class ChainHead extends Model<InferAttributes<ChainHead>> {
  declare chain: string;
  declare deskId: string;
  /** A whole number as text, as the driver gives a bigint. */
  declare position: string;
  declare at: string;
  declare hash: string;
}

ChainHead.init(
  {
    chain: { type: DataTypes.TEXT, primaryKey: true },
    deskId: { type: DataTypes.UUID, allowNull: false },
    position: { type: DataTypes.BIGINT, allowNull: false },
    at: { type: DataTypes.TEXT, allowNull: false },
    hash: { type: DataTypes.TEXT, allowNull: false },
  },
  { sequelize, tableName: 'chain_heads' },
);
