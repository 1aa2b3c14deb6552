import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';

export class DayRate extends Model<InferAttributes<DayRate>, InferCreationAttributes<DayRate>> {
  declare id: string;
  declare metal: 'Au' | 'Ag' | 'Pt' | 'Pd';
  declare day: string;
  declare quoteId: string;
  declare usdPerTroyOunce: string;
  declare createdAt: CreationOptional<Date>;
}

DayRate.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    metal: { type: DataTypes.STRING(32), allowNull: false },
    day: { type: DataTypes.DATEONLY, allowNull: false },
    quoteId: { type: DataTypes.CHAR(36), allowNull: false },
    usdPerTroyOunce: { type: DataTypes.DECIMAL(20, 8), allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'day_rates', modelName: 'DayRate', updatedAt: false },
);
