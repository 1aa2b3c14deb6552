import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { minorColumn } from './columns.ts';
import type { LedgerAccount } from './ledger-account.ts';

export class LedgerEntry extends Model<InferAttributes<LedgerEntry>, InferCreationAttributes<LedgerEntry>> {
  declare id: string;
  declare journalId: string;
  declare accountId: string;
  declare amountMinor: bigint;
  declare currency: string;
  declare createdAt: CreationOptional<Date>;
  declare account?: NonAttribute<LedgerAccount>;
}

LedgerEntry.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    journalId: { type: DataTypes.CHAR(36), allowNull: false },
    accountId: { type: DataTypes.CHAR(36), allowNull: false },
    amountMinor: minorColumn('amountMinor', { allowNull: false }),
    currency: { type: DataTypes.CHAR(3), allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'ledger_entries', modelName: 'LedgerEntry', updatedAt: false },
);
