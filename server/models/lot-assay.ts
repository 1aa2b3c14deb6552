import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';

export class LotAssay extends Model<InferAttributes<LotAssay>, InferCreationAttributes<LotAssay>> {
  declare id: string;
  declare lotId: string;
  declare assayVersion: number;
  declare position: number;
  declare element: string;
  declare finenessValue: string;
  declare finenessUnit: string;
  declare finenessPermille: string;
  declare uncertaintyValue: CreationOptional<string | null>;
  declare uncertaintyUnit: CreationOptional<string | null>;
  declare uncertaintyPermille: string;
  declare isUncertaintyAssumed: boolean;
  declare method: string;
  declare isPaidFor: boolean;
  declare createdAt: CreationOptional<Date>;
}

LotAssay.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    lotId: { type: DataTypes.CHAR(36), allowNull: false },
    assayVersion: { type: DataTypes.INTEGER, allowNull: false },
    position: { type: DataTypes.INTEGER, allowNull: false },
    element: { type: DataTypes.STRING(4), allowNull: false },
    finenessValue: { type: DataTypes.STRING(24), allowNull: false },
    finenessUnit: { type: DataTypes.STRING(12), allowNull: false },
    finenessPermille: { type: DataTypes.DECIMAL(20, 12), allowNull: false },
    uncertaintyValue: { type: DataTypes.STRING(24) },
    uncertaintyUnit: { type: DataTypes.STRING(12) },
    uncertaintyPermille: { type: DataTypes.DECIMAL(20, 12), allowNull: false },
    isUncertaintyAssumed: { type: DataTypes.BOOLEAN, allowNull: false },
    method: { type: DataTypes.STRING(32), allowNull: false },
    isPaidFor: { type: DataTypes.BOOLEAN, allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'lot_assays', modelName: 'LotAssay', updatedAt: false },
);
