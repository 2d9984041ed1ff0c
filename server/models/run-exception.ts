import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import type { ExceptionAnswer, ExceptionKind } from '@/shared/contracts/runs';
import { sequelize } from '../database';
import { Study } from './study';
import { User } from './user';
import { ValuationRun } from './valuation-run';

/** What is wrong with a trade's value in a run, and how that was answered. */
export class RunException extends Model<
  InferAttributes<RunException>,
  InferCreationAttributes<RunException>
> {
  declare id: CreationOptional<string>;
  declare deskId: string;
  declare runId: string;
  declare tradeId: string;
  declare tradeVersionId: string;
  declare kind: ExceptionKind;
  /** Decimal text in the quote currency; null where a route gave no value. */
  declare materiality: string | null;
  declare state: CreationOptional<'open' | 'answered'>;
  declare answerKind: CreationOptional<ExceptionAnswer['kind'] | null>;
  declare studyId: CreationOptional<string | null>;
  declare overrideValue: CreationOptional<string | null>;
  declare rerunId: CreationOptional<string | null>;
  declare reason: CreationOptional<string | null>;
  declare answeredById: CreationOptional<string | null>;
  declare answeredAt: CreationOptional<Date | null>;
  declare study?: NonAttribute<Study | null>;
  declare rerun?: NonAttribute<ValuationRun | null>;
  declare answeredBy?: NonAttribute<User | null>;
}

/** Made anew for each column: Sequelize writes the column's name into what it is given. */
const id = () => ({ type: DataTypes.UUID, allowNull: false });
const text = () => ({ type: DataTypes.TEXT });

RunException.init(
  {
    id: { ...id(), primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    deskId: id(),
    runId: id(),
    tradeId: id(),
    tradeVersionId: id(),
    kind: { ...text(), allowNull: false },
    materiality: { type: DataTypes.DECIMAL },
    state: { ...text(), allowNull: false, defaultValue: 'open' },
    answerKind: text(),
    studyId: { type: DataTypes.UUID },
    overrideValue: { type: DataTypes.DECIMAL },
    rerunId: { type: DataTypes.UUID },
    reason: text(),
    answeredById: { type: DataTypes.UUID },
    answeredAt: { type: DataTypes.DATE(3) },
  },
  { sequelize, tableName: 'run_exceptions' },
);
RunException.belongsTo(Study, { as: 'study', foreignKey: 'studyId' });
RunException.belongsTo(ValuationRun, { as: 'rerun', foreignKey: 'rerunId' });
RunException.belongsTo(User, { as: 'answeredBy', foreignKey: 'answeredById' });
