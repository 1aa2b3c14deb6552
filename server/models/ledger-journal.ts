import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import type { LedgerEntry } from './ledger-entry.ts';

export class LedgerJournal extends Model<
  InferAttributes<LedgerJournal>,
  InferCreationAttributes<LedgerJournal>
> {
  declare id: string;
  declare kind:
    | 'funding'
    | 'provider_fee'
    | 'settlement'
    | 'transfer'
    | 'payout'
    | 'payout_returned'
    | 'refund'
    | 'reversal';
  declare dealId: CreationOptional<string | null>;
  declare uniqueKey: string;
  declare providerObjectId: CreationOptional<string | null>;
  declare reversesJournalId: CreationOptional<string | null>;
  declare memo: string;
  declare at: Date;
  declare createdAt: CreationOptional<Date>;
  declare entries?: NonAttribute<LedgerEntry[]>;
}

LedgerJournal.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    kind: { type: DataTypes.STRING(32), allowNull: false },
    dealId: { type: DataTypes.CHAR(36) },
    uniqueKey: { type: DataTypes.STRING(160), allowNull: false },
    providerObjectId: { type: DataTypes.STRING(120) },
    reversesJournalId: { type: DataTypes.CHAR(36) },
    memo: { type: DataTypes.STRING(200), allowNull: false },
    at: { type: DataTypes.DATE(3), allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'ledger_journals', modelName: 'LedgerJournal', updatedAt: false },
);
