import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { type JsonValue } from './columns.ts';

export class OutboxMail extends Model<InferAttributes<OutboxMail>, InferCreationAttributes<OutboxMail>> {
  declare id: string;
  declare mail: string;
  declare memberId: CreationOptional<string | null>;
  declare dealId: CreationOptional<string | null>;
  declare recipient: string;
  declare uniqueKey: string;
  declare input: JsonValue;
  declare state: 'due' | 'claimed' | 'sent' | 'dead' | 'superseded';
  declare leaseToken: CreationOptional<number>;
  declare leaseUntil: CreationOptional<Date | null>;
  declare tries: CreationOptional<number>;
  declare nextAt: Date;
  declare acceptedAt: CreationOptional<Date | null>;
  declare lastError: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

OutboxMail.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    mail: { type: DataTypes.STRING(40), allowNull: false },
    memberId: { type: DataTypes.CHAR(36) },
    dealId: { type: DataTypes.CHAR(36) },
    recipient: { type: DataTypes.STRING(254), allowNull: false },
    uniqueKey: { type: DataTypes.STRING(160), allowNull: false },
    input: { type: DataTypes.JSON, allowNull: false },
    state: { type: DataTypes.STRING(32), allowNull: false },
    leaseToken: { type: DataTypes.BIGINT, allowNull: false, defaultValue: 0 },
    leaseUntil: { type: DataTypes.DATE(3) },
    tries: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
    nextAt: { type: DataTypes.DATE(3), allowNull: false },
    acceptedAt: { type: DataTypes.DATE(3) },
    lastError: { type: DataTypes.STRING(500) },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    updatedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'outbox_mails', modelName: 'OutboxMail' },
);
