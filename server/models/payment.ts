import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { minorColumn } from './columns.ts';

export class Payment extends Model<InferAttributes<Payment>, InferCreationAttributes<Payment>> {
  declare id: string;
  declare dealId: string;
  declare providerSessionId: CreationOptional<string | null>;
  declare sessionUrl: CreationOptional<string | null>;
  declare state: 'starting' | 'open' | 'paid' | 'expired';
  declare paymentIntentId: CreationOptional<string | null>;
  declare chargeId: CreationOptional<string | null>;
  declare balanceTransactionId: CreationOptional<string | null>;
  /** Counts the sessions of this payment; part of the key under which one is made. */
  declare attempt: CreationOptional<number>;
  declare amountMinor: bigint;
  declare feeMinor: CreationOptional<bigint | null>;
  declare currency: CreationOptional<string>;
  declare expiresAt: Date;
  declare paidAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

Payment.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    dealId: { type: DataTypes.CHAR(36), allowNull: false },
    providerSessionId: { type: DataTypes.STRING(120) },
    sessionUrl: { type: DataTypes.STRING(2000) },
    state: { type: DataTypes.STRING(32), allowNull: false },
    paymentIntentId: { type: DataTypes.STRING(120) },
    chargeId: { type: DataTypes.STRING(120) },
    balanceTransactionId: { type: DataTypes.STRING(120) },
    attempt: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
    amountMinor: minorColumn('amountMinor', { allowNull: false }),
    feeMinor: minorColumn('feeMinor', { allowNull: true }),
    currency: { type: DataTypes.CHAR(3), allowNull: false, defaultValue: 'USD' },
    expiresAt: { type: DataTypes.DATE(3), allowNull: false },
    paidAt: { type: DataTypes.DATE(3) },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    updatedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'payments', modelName: 'Payment' },
);
