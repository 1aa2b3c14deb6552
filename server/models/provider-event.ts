import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';

export class ProviderEvent extends Model<
  InferAttributes<ProviderEvent>,
  InferCreationAttributes<ProviderEvent>
> {
  declare id: string;
  declare type: string;
  declare objectId: string;
  declare accountId: CreationOptional<string | null>;
  declare providerCreatedAt: Date;
  declare receivedAt: Date;
  declare deliveries: CreationOptional<number>;
  declare outcome: 'applied' | 'no_effect' | 'ignored';
  declare createdAt: CreationOptional<Date>;
}

ProviderEvent.init(
  {
    id: { type: DataTypes.STRING(120), primaryKey: true, allowNull: false },
    type: { type: DataTypes.STRING(80), allowNull: false },
    objectId: { type: DataTypes.STRING(120), allowNull: false },
    accountId: { type: DataTypes.STRING(64) },
    providerCreatedAt: { type: DataTypes.DATE(3), allowNull: false },
    receivedAt: { type: DataTypes.DATE(3), allowNull: false },
    deliveries: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
    outcome: { type: DataTypes.STRING(32), allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'provider_events', modelName: 'ProviderEvent', updatedAt: false },
);
