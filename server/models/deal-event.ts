import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { minorColumn, type JsonValue } from './columns.ts';

export class DealEvent extends Model<InferAttributes<DealEvent>, InferCreationAttributes<DealEvent>> {
  declare id: string;
  declare dealId: string;
  declare sequence: number;
  declare act: string;
  declare actorKind: 'buyer' | 'seller' | 'desk' | 'provider' | 'carrier' | 'clock' | 'house';
  declare actorId: CreationOptional<string | null>;
  declare at: Date;
  declare fromState: CreationOptional<string | null>;
  declare toState: CreationOptional<string | null>;
  declare heldMinor: bigint;
  declare detail: JsonValue;
  declare createdAt: CreationOptional<Date>;
}

DealEvent.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    dealId: { type: DataTypes.CHAR(36), allowNull: false },
    sequence: { type: DataTypes.INTEGER, allowNull: false },
    act: { type: DataTypes.STRING(40), allowNull: false },
    actorKind: { type: DataTypes.STRING(32), allowNull: false },
    actorId: { type: DataTypes.CHAR(36) },
    at: { type: DataTypes.DATE(3), allowNull: false },
    fromState: { type: DataTypes.STRING(32) },
    toState: { type: DataTypes.STRING(32) },
    heldMinor: minorColumn('heldMinor', { allowNull: false }),
    detail: { type: DataTypes.JSON, allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'deal_events', modelName: 'DealEvent', updatedAt: false },
);
