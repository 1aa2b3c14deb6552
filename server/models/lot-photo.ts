import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import type { StoredFile } from './stored-file.ts';

export class LotPhoto extends Model<InferAttributes<LotPhoto>, InferCreationAttributes<LotPhoto>> {
  declare id: string;
  declare lotId: string;
  declare fileId: string;
  declare position: number;
  declare caption: CreationOptional<string>;
  declare isDrawing: CreationOptional<boolean>;
  declare createdAt: CreationOptional<Date>;
  declare file?: NonAttribute<StoredFile>;
}

LotPhoto.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    lotId: { type: DataTypes.CHAR(36), allowNull: false },
    fileId: { type: DataTypes.CHAR(36), allowNull: false },
    position: { type: DataTypes.INTEGER, allowNull: false },
    caption: { type: DataTypes.STRING(200), allowNull: false, defaultValue: '' },
    isDrawing: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'lot_photos', modelName: 'LotPhoto', updatedAt: false },
);
