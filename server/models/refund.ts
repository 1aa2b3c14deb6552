import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { minorColumn } from './columns.ts';

export class Refund extends Model<InferAttributes<Refund>, InferCreationAttributes<Refund>> {
  declare id: string;
  declare dealId: string;
  declare providerRefundId: CreationOptional<string | null>;
  declare amountMinor: bigint;
  declare currency: CreationOptional<string>;
  declare state: 'due' | 'sent' | 'succeeded' | 'failed';
  declare reason: string;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

Refund.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    dealId: { type: DataTypes.CHAR(36), allowNull: false },
    providerRefundId: { type: DataTypes.STRING(120) },
    amountMinor: minorColumn('amountMinor', { allowNull: false }),
    currency: { type: DataTypes.CHAR(3), allowNull: false, defaultValue: 'USD' },
    state: { type: DataTypes.STRING(32), allowNull: false },
    reason: { type: DataTypes.STRING(60), allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    updatedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'refunds', modelName: 'Refund' },
);
