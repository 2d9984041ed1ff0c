import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import type { AccessEvent } from '@/shared/contracts/people';
import type { DeskRole, Permission } from '@/shared/permissions';
import { sequelize } from '../database';
import { User } from './user';

/** One change of what a member may do. Rows are added only; `app` may not update or delete them. */
export class Grant extends Model<InferAttributes<Grant>, InferCreationAttributes<Grant>> {
  declare id: CreationOptional<string>;
  declare deskId: string;
  declare subjectId: string;
  declare kind: AccessEvent['kind'];
  declare permission: CreationOptional<Permission | null>;
  declare role: CreationOptional<DeskRole | null>;
  declare previousRole: CreationOptional<DeskRole | null>;
  /** Last day, on the desk's calendar, on which it holds. */
  declare endsOn: CreationOptional<string | null>;
  /** The grant or withdrawal that a `change-ended` row ends. */
  declare endedGrantId: CreationOptional<string | null>;
  declare reason: string;
  declare madeById: string;
  declare madeAt: CreationOptional<Date>;
  declare madeBy?: NonAttribute<User>;
  declare subject?: NonAttribute<User>;
  declare ending?: NonAttribute<Grant | null>;
}

Grant.init(
  {
    id: { type: DataTypes.UUID, primaryKey: true, defaultValue: DataTypes.UUIDV4 },
    deskId: { type: DataTypes.UUID, allowNull: false },
    subjectId: { type: DataTypes.UUID, allowNull: false },
    kind: { type: DataTypes.TEXT, allowNull: false },
    permission: { type: DataTypes.TEXT },
    role: { type: DataTypes.TEXT },
    previousRole: { type: DataTypes.TEXT },
    endsOn: { type: DataTypes.DATEONLY },
    endedGrantId: { type: DataTypes.UUID },
    reason: { type: DataTypes.TEXT, allowNull: false },
    madeById: { type: DataTypes.UUID, allowNull: false },
    madeAt: { type: DataTypes.DATE(3), allowNull: false, defaultValue: DataTypes.NOW },
  },
  { sequelize, tableName: 'grants' },
);
Grant.belongsTo(User, { as: 'madeBy', foreignKey: 'madeById' });
Grant.belongsTo(User, { as: 'subject', foreignKey: 'subjectId' });
Grant.hasOne(Grant, { as: 'ending', foreignKey: 'endedGrantId' });
