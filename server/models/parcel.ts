import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { minorColumn } from './columns.ts';

export class Parcel extends Model<InferAttributes<Parcel>, InferCreationAttributes<Parcel>> {
  declare id: string;
  declare dealId: string;
  declare carrier: string;
  declare trackingNumber: string;
  declare insuredMinor: bigint;
  declare currency: CreationOptional<string>;
  declare trackerStatus: CreationOptional<string>;
  declare registeredAt: CreationOptional<Date | null>;
  declare deliveredAt: CreationOptional<Date | null>;
  declare isSigned: CreationOptional<boolean | null>;
  declare signedBy: CreationOptional<string | null>;
  declare checkedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

Parcel.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    dealId: { type: DataTypes.CHAR(36), allowNull: false },
    carrier: { type: DataTypes.STRING(40), allowNull: false },
    trackingNumber: { type: DataTypes.STRING(60), allowNull: false },
    insuredMinor: minorColumn('insuredMinor', { allowNull: false }),
    currency: { type: DataTypes.CHAR(3), allowNull: false, defaultValue: 'USD' },
    trackerStatus: { type: DataTypes.STRING(20), allowNull: false, defaultValue: 'registered' },
    registeredAt: { type: DataTypes.DATE(3) },
    deliveredAt: { type: DataTypes.DATE(3) },
    isSigned: { type: DataTypes.BOOLEAN },
    signedBy: { type: DataTypes.STRING(120) },
    checkedAt: { type: DataTypes.DATE(3) },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    updatedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'parcels', modelName: 'Parcel' },
);
