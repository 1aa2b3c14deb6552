import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';

export class Laboratory extends Model<InferAttributes<Laboratory>, InferCreationAttributes<Laboratory>> {
  declare id: string;
  declare name: string;
  declare accreditationBody: string;
  declare accreditationNumber: string;
  declare scope: string;
  declare region: string;
  declare contact: string;
  declare validUntil: string;
  declare isActive: CreationOptional<boolean>;
  declare lockVersion: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

Laboratory.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    name: { type: DataTypes.STRING(120), allowNull: false },
    accreditationBody: { type: DataTypes.STRING(120), allowNull: false },
    accreditationNumber: { type: DataTypes.STRING(60), allowNull: false },
    scope: { type: DataTypes.STRING(500), allowNull: false },
    region: { type: DataTypes.STRING(60), allowNull: false },
    contact: { type: DataTypes.STRING(254), allowNull: false },
    validUntil: { type: DataTypes.DATEONLY, allowNull: false },
    isActive: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: true },
    lockVersion: { type: DataTypes.BIGINT, allowNull: false, defaultValue: 0 },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    updatedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'laboratories', modelName: 'Laboratory' },
);
