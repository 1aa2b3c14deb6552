import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { minorColumn, type JsonValue } from './columns.ts';

export class PriceFix extends Model<InferAttributes<PriceFix>, InferCreationAttributes<PriceFix>> {
  declare id: string;
  declare memberId: string;
  declare lotId: string;
  declare state: 'open' | 'used' | 'ran_out' | 'given_up';
  declare openMemberId: CreationOptional<string | null>;
  declare openLotId: CreationOptional<string | null>;
  declare percent: string;
  declare priceMinor: bigint;
  /** The quotes that the price was fixed at, as a sheet names them. */
  declare quotes: JsonValue;
  declare fixedAt: Date;
  declare fixedUntil: Date;
  declare endedAt: CreationOptional<Date | null>;
  declare dealId: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

PriceFix.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    memberId: { type: DataTypes.CHAR(36), allowNull: false },
    lotId: { type: DataTypes.CHAR(36), allowNull: false },
    state: { type: DataTypes.STRING(16), allowNull: false },
    openMemberId: { type: DataTypes.CHAR(36) },
    openLotId: { type: DataTypes.CHAR(36) },
    percent: { type: DataTypes.DECIMAL(8, 4), allowNull: false },
    priceMinor: minorColumn('priceMinor', { allowNull: false }),
    quotes: { type: DataTypes.JSON, allowNull: false },
    fixedAt: { type: DataTypes.DATE(3), allowNull: false },
    fixedUntil: { type: DataTypes.DATE(3), allowNull: false },
    endedAt: { type: DataTypes.DATE(3) },
    dealId: { type: DataTypes.CHAR(36) },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    updatedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'price_fixes', modelName: 'PriceFix' },
);
