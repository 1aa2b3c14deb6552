import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';

export class SessionRow extends Model<InferAttributes<SessionRow>, InferCreationAttributes<SessionRow>> {
  declare sid: string;
  declare expires: CreationOptional<Date | null>;
  declare data: CreationOptional<string | null>;
  declare memberId: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

SessionRow.init(
  {
    sid: { type: DataTypes.STRING(36), primaryKey: true, allowNull: false },
    expires: { type: DataTypes.DATE(3) },
    data: { type: DataTypes.TEXT },
    memberId: { type: DataTypes.CHAR(36) },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    updatedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'sessions', modelName: 'SessionRow' },
);
