import { DataTypes, Model, type InferAttributes, type InferCreationAttributes } from 'sequelize';
import type { MethodName, PricingResult } from '@/pricing/contract';
import { sequelize } from '../database';

/** One rung of a study's ladder, as computed. Rows are added only. */
export class StudyRow extends Model<InferAttributes<StudyRow>, InferCreationAttributes<StudyRow>> {
  declare studyId: string;
  declare route: MethodName;
  declare ordinal: number;
  declare result: PricingResult;
  declare milliseconds: number;
}

StudyRow.init(
  {
    studyId: { type: DataTypes.UUID, primaryKey: true },
    route: { type: DataTypes.TEXT, primaryKey: true },
    ordinal: { type: DataTypes.INTEGER, primaryKey: true },
    result: { type: DataTypes.JSONB, allowNull: false },
    milliseconds: { type: DataTypes.DOUBLE, allowNull: false },
  },
  { sequelize, tableName: 'study_rows' },
);
