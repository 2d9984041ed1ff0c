import { DataTypes, Model, type InferAttributes } from 'sequelize';
import { sequelize } from '../database';

/** One sealed entry. Written by `append` only; all but the first six columns come from the body. */
export class ChainEntry extends Model<InferAttributes<ChainEntry>> {
  declare chain: string;
  /** A whole number as text, as the driver gives a bigint. */
  declare position: string;
  declare at: string;
  /** Column `previous`, a word that the library keeps for itself. */
  declare previousHash: string;
  declare hash: string;
  declare body: string;
  declare kind: string;
  declare subjectId: string | null;
  declare runId: string | null;
  declare runNumber: string | null;
  declare tradeNumber: string | null;
  declare tradeVersionId: string | null;
  declare bookId: string | null;
  declare underlyingId: string | null;
  declare route: string | null;
  declare role: string | null;
  declare verdict: string | null;
  declare valuedAt: string | null;
}

/** Made afresh for each: the library writes the column's name into what it is given. */
const text = () => ({ type: DataTypes.TEXT });
const id = () => ({ type: DataTypes.UUID });

ChainEntry.init(
  {
    chain: { ...text(), primaryKey: true },
    position: { type: DataTypes.BIGINT, primaryKey: true },
    at: { ...text(), allowNull: false },
    previousHash: { ...text(), allowNull: false, field: 'previous' },
    hash: { ...text(), allowNull: false },
    body: { ...text(), allowNull: false },
    kind: { ...text(), allowNull: false },
    subjectId: id(),
    runId: id(),
    runNumber: text(),
    tradeNumber: text(),
    tradeVersionId: id(),
    bookId: id(),
    underlyingId: id(),
    route: text(),
    role: text(),
    verdict: text(),
    valuedAt: text(),
  },
  { sequelize, tableName: 'chain_entries' },
);
