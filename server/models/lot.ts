import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { minorColumn, type JsonValue } from './columns.ts';
import type { Certificate } from './certificate.ts';
import type { LotAssay } from './lot-assay.ts';
import type { LotPhoto } from './lot-photo.ts';
import type { Member } from './member.ts';

export class Lot extends Model<InferAttributes<Lot>, InferCreationAttributes<Lot>> {
  declare id: string;
  declare code: string;
  declare sellerId: string;
  declare state:
    'draft' | 'submitted' | 'returned' | 'open' | 'reserved' | 'sold' | 'paused' | 'closed' | 'withdrawn';
  declare draft: JsonValue;
  /** Counts the saves of the draft alone, so that a photo added in between is no conflict. */
  declare draftVersion: CreationOptional<number>;
  declare form: CreationOptional<
    'button' | 'bar' | 'grain' | 'karat_scrap' | 'plated_scrap' | 'e_scrap' | 'sweeps' | null
  >;
  declare title: CreationOptional<string | null>;
  declare description: CreationOptional<string | null>;
  declare region: string;
  declare grossValue: CreationOptional<string | null>;
  declare grossUnit: CreationOptional<string | null>;
  declare grossGrams: CreationOptional<string | null>;
  declare readabilityValue: CreationOptional<string | null>;
  declare readabilityUnit: CreationOptional<string | null>;
  declare pricingBasis: CreationOptional<'outright' | 'linked' | 'ascending' | 'tender'>;
  declare settlesOn: CreationOptional<'stated' | 'final'>;
  declare priceMinor: CreationOptional<bigint | null>;
  /** Share of melt of a linked lot; a lot has this or a sum, never both. */
  declare linkedPercent: CreationOptional<string | null>;
  declare floorPercent: CreationOptional<string | null>;
  declare shippingMinor: CreationOptional<bigint | null>;
  declare currency: CreationOptional<string>;
  declare destinations: JsonValue;
  declare evidenceGrade: CreationOptional<'certified' | 'examined' | 'declared'>;
  declare assayVersion: CreationOptional<number>;
  declare mainMetal: CreationOptional<'Au' | 'Ag' | 'Pt' | 'Pd' | null>;
  declare mainFinenessPermille: CreationOptional<string | null>;
  declare mainFineGrams: CreationOptional<string | null>;
  declare rankPrice: CreationOptional<string | null>;
  declare confirmedAt: CreationOptional<Date | null>;
  declare rulesVersion: CreationOptional<string | null>;
  declare submittedAt: CreationOptional<Date | null>;
  declare openedAt: CreationOptional<Date | null>;
  declare closesAt: CreationOptional<Date | null>;
  declare endedAt: CreationOptional<Date | null>;
  declare stateReason: CreationOptional<string | null>;
  declare pulledByDesk: CreationOptional<boolean>;
  declare lockVersion: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
  declare seller?: NonAttribute<Member>;
  declare assays?: NonAttribute<LotAssay[]>;
  declare photos?: NonAttribute<LotPhoto[]>;
  declare certificates?: NonAttribute<Certificate[]>;
}

Lot.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    code: { type: DataTypes.STRING(16), allowNull: false },
    sellerId: { type: DataTypes.CHAR(36), allowNull: false },
    state: { type: DataTypes.STRING(32), allowNull: false },
    draft: { type: DataTypes.JSON, allowNull: false },
    draftVersion: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
    form: { type: DataTypes.STRING(32) },
    title: { type: DataTypes.STRING(120) },
    description: { type: DataTypes.TEXT },
    region: { type: DataTypes.STRING(60), allowNull: false },
    // As typed: the last digit typed is the default of the readability, so no digit may be added or lost.
    grossValue: { type: DataTypes.STRING(24) },
    grossUnit: { type: DataTypes.STRING(8) },
    grossGrams: { type: DataTypes.DECIMAL(30, 15) },
    readabilityValue: { type: DataTypes.STRING(24) },
    readabilityUnit: { type: DataTypes.STRING(8) },
    pricingBasis: { type: DataTypes.STRING(16), allowNull: false, defaultValue: 'outright' },
    settlesOn: { type: DataTypes.STRING(16), allowNull: false, defaultValue: 'stated' },
    priceMinor: minorColumn('priceMinor', { allowNull: true }),
    linkedPercent: { type: DataTypes.DECIMAL(8, 4) },
    floorPercent: { type: DataTypes.DECIMAL(8, 4) },
    shippingMinor: minorColumn('shippingMinor', { allowNull: true }),
    currency: { type: DataTypes.CHAR(3), allowNull: false, defaultValue: 'USD' },
    destinations: { type: DataTypes.JSON, allowNull: false },
    evidenceGrade: { type: DataTypes.STRING(16), allowNull: false, defaultValue: 'declared' },
    assayVersion: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
    mainMetal: { type: DataTypes.STRING(32) },
    mainFinenessPermille: { type: DataTypes.DECIMAL(20, 12) },
    mainFineGrams: { type: DataTypes.DECIMAL(30, 15) },
    rankPrice: { type: DataTypes.DECIMAL(30, 8) },
    confirmedAt: { type: DataTypes.DATE(3) },
    rulesVersion: { type: DataTypes.STRING(16) },
    submittedAt: { type: DataTypes.DATE(3) },
    openedAt: { type: DataTypes.DATE(3) },
    closesAt: { type: DataTypes.DATE(3) },
    endedAt: { type: DataTypes.DATE(3) },
    stateReason: { type: DataTypes.STRING(1000) },
    pulledByDesk: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
    lockVersion: { type: DataTypes.BIGINT, allowNull: false, defaultValue: 0 },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    updatedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'lots', modelName: 'Lot' },
);
