import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';

export class CertificateResult extends Model<
  InferAttributes<CertificateResult>,
  InferCreationAttributes<CertificateResult>
> {
  declare id: string;
  declare certificateId: string;
  declare position: number;
  declare element: string;
  declare finenessPermille: string;
  declare uncertaintyPermille: CreationOptional<string | null>;
  declare method: string;
  declare createdAt: CreationOptional<Date>;
}

CertificateResult.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    certificateId: { type: DataTypes.CHAR(36), allowNull: false },
    position: { type: DataTypes.INTEGER, allowNull: false },
    element: { type: DataTypes.STRING(4), allowNull: false },
    finenessPermille: { type: DataTypes.DECIMAL(20, 12), allowNull: false },
    uncertaintyPermille: { type: DataTypes.DECIMAL(20, 12) },
    method: { type: DataTypes.STRING(32), allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'certificate_results', modelName: 'CertificateResult', updatedAt: false },
);
