import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { minorColumn } from './columns.ts';

export class LedgerBalance extends Model<
  InferAttributes<LedgerBalance>,
  InferCreationAttributes<LedgerBalance>
> {
  declare accountId: string;
  declare kind: 'escrow' | 'member_payable' | 'member_connected';
  declare amountMinor: CreationOptional<bigint>;
  declare lockVersion: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

LedgerBalance.init(
  {
    accountId: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    kind: { type: DataTypes.STRING(32), allowNull: false },
    amountMinor: minorColumn('amountMinor', { allowNull: false }),
    lockVersion: { type: DataTypes.BIGINT, allowNull: false, defaultValue: 0 },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    updatedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'ledger_balances', modelName: 'LedgerBalance' },
);
