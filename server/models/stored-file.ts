import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';

export class StoredFile extends Model<InferAttributes<StoredFile>, InferCreationAttributes<StoredFile>> {
  declare id: string;
  declare ownerId: string;
  declare kind: 'photo' | 'certificate' | 'receipt_photo' | 'sheet';
  declare sha256: string;
  declare mediaType: string;
  declare byteCount: number;
  declare width: CreationOptional<number | null>;
  declare height: CreationOptional<number | null>;
  declare originalName: string;
  declare storageKey: string;
  declare createdAt: CreationOptional<Date>;
}

StoredFile.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    ownerId: { type: DataTypes.CHAR(36), allowNull: false },
    kind: { type: DataTypes.STRING(32), allowNull: false },
    sha256: { type: DataTypes.CHAR(64), allowNull: false },
    mediaType: { type: DataTypes.STRING(60), allowNull: false },
    byteCount: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    width: { type: DataTypes.INTEGER.UNSIGNED },
    height: { type: DataTypes.INTEGER.UNSIGNED },
    originalName: { type: DataTypes.STRING(255), allowNull: false },
    storageKey: { type: DataTypes.STRING(120), allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'files', modelName: 'StoredFile', updatedAt: false },
);
