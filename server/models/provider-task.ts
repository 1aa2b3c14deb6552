import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { type JsonValue } from './columns.ts';

export class ProviderTask extends Model<
  InferAttributes<ProviderTask>,
  InferCreationAttributes<ProviderTask>
> {
  declare id: string;
  declare dealId: string;
  declare kind: 'expire_session' | 'refund' | 'refund_second' | 'transfer' | 'payout' | 'register_parcel';
  declare idempotencyKey: string;
  /** Which key of this task is in use at the provider, and since when: a burnt or aged one gives way to the next. */
  declare keyVersion: CreationOptional<number>;
  declare keySince: CreationOptional<Date | null>;
  declare state: 'due' | 'claimed' | 'done' | 'given_up';
  declare payload: JsonValue;
  declare providerObjectId: CreationOptional<string | null>;
  declare leaseOwner: CreationOptional<string | null>;
  declare leaseUntil: CreationOptional<Date | null>;
  declare leaseToken: CreationOptional<number>;
  declare tries: CreationOptional<number>;
  declare nextAt: Date;
  declare lastError: CreationOptional<string | null>;
  declare doneAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

ProviderTask.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    dealId: { type: DataTypes.CHAR(36), allowNull: false },
    kind: { type: DataTypes.STRING(32), allowNull: false },
    idempotencyKey: { type: DataTypes.STRING(255), allowNull: false },
    keyVersion: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
    keySince: { type: DataTypes.DATE(3) },
    state: { type: DataTypes.STRING(32), allowNull: false },
    payload: { type: DataTypes.JSON, allowNull: false },
    providerObjectId: { type: DataTypes.STRING(120) },
    leaseOwner: { type: DataTypes.STRING(80) },
    leaseUntil: { type: DataTypes.DATE(3) },
    leaseToken: { type: DataTypes.BIGINT, allowNull: false, defaultValue: 0 },
    tries: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
    nextAt: { type: DataTypes.DATE(3), allowNull: false },
    lastError: { type: DataTypes.STRING(500) },
    doneAt: { type: DataTypes.DATE(3) },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    updatedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'provider_tasks', modelName: 'ProviderTask' },
);
