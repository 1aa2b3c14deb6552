import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { type JsonValue } from './columns.ts';

export class AuditEntry extends Model<InferAttributes<AuditEntry>, InferCreationAttributes<AuditEntry>> {
  declare id: string;
  declare actorId: CreationOptional<string | null>;
  declare actorRole: string;
  declare act: string;
  declare subjectKind: string;
  declare subjectId: string;
  declare at: Date;
  declare detail: JsonValue;
  declare createdAt: CreationOptional<Date>;
}

AuditEntry.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    actorId: { type: DataTypes.CHAR(36) },
    actorRole: { type: DataTypes.STRING(16), allowNull: false },
    act: { type: DataTypes.STRING(60), allowNull: false },
    subjectKind: { type: DataTypes.STRING(32), allowNull: false },
    subjectId: { type: DataTypes.STRING(120), allowNull: false },
    at: { type: DataTypes.DATE(3), allowNull: false },
    detail: { type: DataTypes.JSON, allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'audit_entries', modelName: 'AuditEntry', updatedAt: false },
);
