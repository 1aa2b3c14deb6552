import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { minorColumn } from './columns.ts';

export class Payout extends Model<InferAttributes<Payout>, InferCreationAttributes<Payout>> {
  declare id: string;
  declare dealId: string;
  declare memberId: string;
  declare providerAccountId: string;
  declare providerTransferId: CreationOptional<string | null>;
  declare providerPayoutId: CreationOptional<string | null>;
  /** Counts the tries to reach the bank; a failed payout is sent anew under the next number. */
  declare attempt: CreationOptional<number>;
  declare amountMinor: bigint;
  declare currency: CreationOptional<string>;
  declare state: 'due' | 'transferred' | 'sent' | 'paid' | 'failed';
  declare failureCode: CreationOptional<string | null>;
  declare paidAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

Payout.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    dealId: { type: DataTypes.CHAR(36), allowNull: false },
    memberId: { type: DataTypes.CHAR(36), allowNull: false },
    providerAccountId: { type: DataTypes.STRING(64), allowNull: false },
    providerTransferId: { type: DataTypes.STRING(120) },
    providerPayoutId: { type: DataTypes.STRING(120) },
    attempt: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
    amountMinor: minorColumn('amountMinor', { allowNull: false }),
    currency: { type: DataTypes.CHAR(3), allowNull: false, defaultValue: 'USD' },
    state: { type: DataTypes.STRING(32), allowNull: false },
    failureCode: { type: DataTypes.STRING(60) },
    paidAt: { type: DataTypes.DATE(3) },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    updatedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'payouts', modelName: 'Payout' },
);
