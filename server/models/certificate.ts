import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { type JsonValue } from './columns.ts';
import type { CertificateResult } from './certificate-result.ts';
import type { Laboratory } from './laboratory.ts';
import type { Lot } from './lot.ts';
import type { StoredFile } from './stored-file.ts';

export class Certificate extends Model<InferAttributes<Certificate>, InferCreationAttributes<Certificate>> {
  declare id: string;
  declare lotId: string;
  declare assayVersion: number;
  declare state: 'submitted' | 'claimed' | 'verified' | 'examined' | 'returned' | 'superseded';
  declare fileId: string;
  declare laboratoryId: CreationOptional<string | null>;
  declare laboratoryName: string;
  declare number: string;
  declare issuedOn: string;
  declare sampling: 'laboratory' | 'whole_piece' | 'customer' | 'not_stated';
  declare itemMassValue: CreationOptional<string | null>;
  declare itemMassUnit: CreationOptional<string | null>;
  declare itemMassGrams: CreationOptional<string | null>;
  declare itemMark: CreationOptional<string | null>;
  declare reportFields: JsonValue;
  declare sha256: string;
  declare liveKey: CreationOptional<string | null>;
  declare claimedById: CreationOptional<string | null>;
  declare claimedAt: CreationOptional<Date | null>;
  declare decidedById: CreationOptional<string | null>;
  declare decidedAt: CreationOptional<Date | null>;
  declare confirmedHow: CreationOptional<string | null>;
  declare confirmedWith: CreationOptional<string | null>;
  declare confirmedOn: CreationOptional<string | null>;
  declare grade: CreationOptional<'certified' | 'examined' | 'declared' | null>;
  declare returnReason: CreationOptional<string | null>;
  declare submittedAt: Date;
  declare lockVersion: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
  declare lot?: NonAttribute<Lot>;
  declare file?: NonAttribute<StoredFile>;
  declare laboratory?: NonAttribute<Laboratory>;
  declare results?: NonAttribute<CertificateResult[]>;
}

Certificate.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    lotId: { type: DataTypes.CHAR(36), allowNull: false },
    assayVersion: { type: DataTypes.INTEGER, allowNull: false },
    state: { type: DataTypes.STRING(32), allowNull: false },
    fileId: { type: DataTypes.CHAR(36), allowNull: false },
    laboratoryId: { type: DataTypes.CHAR(36) },
    laboratoryName: { type: DataTypes.STRING(120), allowNull: false },
    number: { type: DataTypes.STRING(60), allowNull: false },
    issuedOn: { type: DataTypes.DATEONLY, allowNull: false },
    sampling: { type: DataTypes.STRING(32), allowNull: false },
    itemMassValue: { type: DataTypes.STRING(24) },
    itemMassUnit: { type: DataTypes.STRING(8) },
    itemMassGrams: { type: DataTypes.DECIMAL(30, 15) },
    itemMark: { type: DataTypes.STRING(120) },
    reportFields: { type: DataTypes.JSON, allowNull: false },
    sha256: { type: DataTypes.CHAR(64), allowNull: false },
    liveKey: { type: DataTypes.STRING(200) },
    claimedById: { type: DataTypes.CHAR(36) },
    claimedAt: { type: DataTypes.DATE(3) },
    decidedById: { type: DataTypes.CHAR(36) },
    decidedAt: { type: DataTypes.DATE(3) },
    confirmedHow: { type: DataTypes.STRING(500) },
    confirmedWith: { type: DataTypes.STRING(200) },
    confirmedOn: { type: DataTypes.DATEONLY },
    grade: { type: DataTypes.STRING(16) },
    returnReason: { type: DataTypes.STRING(1000) },
    submittedAt: { type: DataTypes.DATE(3), allowNull: false },
    lockVersion: { type: DataTypes.BIGINT, allowNull: false, defaultValue: 0 },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    updatedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'certificates', modelName: 'Certificate' },
);
