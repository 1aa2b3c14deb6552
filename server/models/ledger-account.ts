import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';

export class LedgerAccount extends Model<
  InferAttributes<LedgerAccount>,
  InferCreationAttributes<LedgerAccount>
> {
  declare id: string;
  declare kind:
    'provider' | 'escrow' | 'member_payable' | 'member_connected' | 'commission' | 'provider_fees';
  declare ownerId: string;
  declare currency: string;
  declare createdAt: CreationOptional<Date>;
}

LedgerAccount.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    kind: { type: DataTypes.STRING(32), allowNull: false },
    ownerId: { type: DataTypes.CHAR(36), allowNull: false },
    currency: { type: DataTypes.CHAR(3), allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'ledger_accounts', modelName: 'LedgerAccount', updatedAt: false },
);
