import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';

export class DealReceipt extends Model<InferAttributes<DealReceipt>, InferCreationAttributes<DealReceipt>> {
  declare id: string;
  declare dealId: string;
  declare massValue: string;
  declare massUnit: string;
  declare massGrams: string;
  declare photoFileId: CreationOptional<string | null>;
  declare recordedAt: Date;
  declare createdAt: CreationOptional<Date>;
}

DealReceipt.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    dealId: { type: DataTypes.CHAR(36), allowNull: false },
    massValue: { type: DataTypes.STRING(24), allowNull: false },
    massUnit: { type: DataTypes.STRING(8), allowNull: false },
    massGrams: { type: DataTypes.DECIMAL(30, 15), allowNull: false },
    photoFileId: { type: DataTypes.CHAR(36) },
    recordedAt: { type: DataTypes.DATE(3), allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'deal_receipts', modelName: 'DealReceipt', updatedAt: false },
);
