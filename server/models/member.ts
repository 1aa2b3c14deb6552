import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import type { PayoutAccount } from './payout-account.ts';

export class Member extends Model<InferAttributes<Member>, InferCreationAttributes<Member>> {
  declare id: string;
  declare email: string;
  declare passwordHash: string;
  declare displayName: string;
  declare role: 'member' | 'desk' | 'lab' | 'admin';
  declare region: string;
  declare weightUnit: CreationOptional<'g' | 'ozt' | 'dwt' | 'gr'>;
  declare timeZone: CreationOptional<string>;
  declare suspendedAt: CreationOptional<Date | null>;
  declare suspensionReason: CreationOptional<string | null>;
  declare lockVersion: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
  declare payoutAccount?: NonAttribute<PayoutAccount>;
}

Member.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    email: { type: DataTypes.STRING(254), allowNull: false },
    passwordHash: { type: DataTypes.STRING(255), allowNull: false },
    displayName: { type: DataTypes.STRING(80), allowNull: false },
    role: { type: DataTypes.STRING(32), allowNull: false },
    region: { type: DataTypes.STRING(60), allowNull: false },
    weightUnit: { type: DataTypes.STRING(8), allowNull: false, defaultValue: 'g' },
    timeZone: { type: DataTypes.STRING(64), allowNull: false, defaultValue: 'UTC' },
    suspendedAt: { type: DataTypes.DATE(3) },
    suspensionReason: { type: DataTypes.STRING(500) },
    lockVersion: { type: DataTypes.BIGINT, allowNull: false, defaultValue: 0 },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    updatedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'members', modelName: 'Member' },
);
