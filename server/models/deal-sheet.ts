import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { type JsonValue } from './columns.ts';

export class DealSheet extends Model<InferAttributes<DealSheet>, InferCreationAttributes<DealSheet>> {
  declare id: string;
  declare dealId: string;
  declare moment: 'provisional' | 'final';
  declare engineVersion: string;
  declare input: JsonValue;
  declare buyerSheet: JsonValue;
  declare sellerSheet: JsonValue;
  declare createdAt: CreationOptional<Date>;
}

DealSheet.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    dealId: { type: DataTypes.CHAR(36), allowNull: false },
    moment: { type: DataTypes.STRING(32), allowNull: false },
    engineVersion: { type: DataTypes.STRING(16), allowNull: false },
    input: { type: DataTypes.JSON, allowNull: false },
    buyerSheet: { type: DataTypes.JSON, allowNull: false },
    sellerSheet: { type: DataTypes.JSON, allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'deal_sheets', modelName: 'DealSheet', updatedAt: false },
);
