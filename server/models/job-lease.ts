import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { type JsonValue } from './columns.ts';

export class JobLease extends Model<InferAttributes<JobLease>, InferCreationAttributes<JobLease>> {
  declare name: string;
  declare owner: CreationOptional<string | null>;
  declare token: CreationOptional<number>;
  declare leasedUntil: CreationOptional<Date | null>;
  declare lastStartedAt: CreationOptional<Date | null>;
  declare lastFinishedAt: CreationOptional<Date | null>;
  declare lastOutcome: CreationOptional<string | null>;
  declare lastDetail: CreationOptional<JsonValue | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

JobLease.init(
  {
    name: { type: DataTypes.STRING(60), primaryKey: true, allowNull: false },
    owner: { type: DataTypes.STRING(80) },
    token: { type: DataTypes.BIGINT, allowNull: false, defaultValue: 0 },
    leasedUntil: { type: DataTypes.DATE(3) },
    lastStartedAt: { type: DataTypes.DATE(3) },
    lastFinishedAt: { type: DataTypes.DATE(3) },
    lastOutcome: { type: DataTypes.STRING(20) },
    lastDetail: { type: DataTypes.JSON },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    updatedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'job_leases', modelName: 'JobLease' },
);
