import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { type JsonValue } from './columns.ts';

export class PayoutAccount extends Model<
  InferAttributes<PayoutAccount>,
  InferCreationAttributes<PayoutAccount>
> {
  declare id: string;
  declare memberId: string;
  declare providerAccountId: CreationOptional<string | null>;
  declare detailsSubmitted: CreationOptional<boolean>;
  declare transfersActive: CreationOptional<boolean>;
  declare payoutsEnabled: CreationOptional<boolean>;
  declare requirements: JsonValue;
  declare checkedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

PayoutAccount.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    memberId: { type: DataTypes.CHAR(36), allowNull: false },
    providerAccountId: { type: DataTypes.STRING(64) },
    detailsSubmitted: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
    transfersActive: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
    payoutsEnabled: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
    requirements: { type: DataTypes.JSON, allowNull: false },
    checkedAt: { type: DataTypes.DATE(3) },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    updatedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'payout_accounts', modelName: 'PayoutAccount' },
);
