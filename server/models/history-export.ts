import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import type { ExportFormat, Manifest } from '@/shared/contracts/exports';
import type { HistoryFilter } from '@/shared/contracts/history';
import { sequelize } from '../database';
import { User } from './user';

/** A file of the history: asked for, being written, or ready with its bytes and its manifest. */
export class HistoryExport extends Model<
  InferAttributes<HistoryExport>,
  InferCreationAttributes<HistoryExport>
> {
  declare id: CreationOptional<string>;
  declare deskId: string;
  declare format: ExportFormat;
  declare filter: HistoryFilter;
  /** Entries behind this place are not part of it. A whole number as text. */
  declare upToPosition: string;
  declare status: CreationOptional<'queued' | 'running' | 'ready'>;
  declare total: number;
  declare done: CreationOptional<number>;
  declare content: CreationOptional<Buffer | null>;
  declare sha256: CreationOptional<string | null>;
  declare manifest: CreationOptional<Manifest | null>;
  declare createdById: string;
  declare createdAt: CreationOptional<Date>;
  declare readyAt: CreationOptional<Date | null>;
  declare createdBy?: NonAttribute<User>;
}

HistoryExport.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    deskId: { type: DataTypes.UUID, allowNull: false },
    format: { type: DataTypes.TEXT, allowNull: false },
    filter: { type: DataTypes.JSONB, allowNull: false },
    upToPosition: { type: DataTypes.BIGINT, allowNull: false },
    status: { type: DataTypes.TEXT, allowNull: false, defaultValue: 'queued' },
    total: { type: DataTypes.INTEGER, allowNull: false },
    done: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
    content: { type: DataTypes.BLOB },
    sha256: { type: DataTypes.TEXT },
    manifest: { type: DataTypes.JSONB },
    createdById: { type: DataTypes.UUID, allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false, defaultValue: DataTypes.NOW },
    readyAt: { type: DataTypes.DATE(3) },
  },
  { sequelize, tableName: 'exports' },
);
HistoryExport.belongsTo(User, { as: 'createdBy', foreignKey: 'createdById' });
