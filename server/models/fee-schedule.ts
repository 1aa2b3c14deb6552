import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { minorColumn } from './columns.ts';

export class FeeSchedule extends Model<InferAttributes<FeeSchedule>, InferCreationAttributes<FeeSchedule>> {
  declare id: string;
  declare paymentMethod: 'card' | 'bank_debit';
  declare percent: string;
  declare minimumMinor: bigint;
  declare currency: CreationOptional<string>;
  declare validFrom: Date;
  declare createdAt: CreationOptional<Date>;
}

FeeSchedule.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    paymentMethod: { type: DataTypes.STRING(32), allowNull: false },
    percent: { type: DataTypes.DECIMAL(8, 4), allowNull: false },
    minimumMinor: minorColumn('minimumMinor', { allowNull: false }),
    currency: { type: DataTypes.CHAR(3), allowNull: false, defaultValue: 'USD' },
    validFrom: { type: DataTypes.DATE(3), allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'fee_schedules', modelName: 'FeeSchedule', updatedAt: false },
);
