import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { type JsonValue } from './columns.ts';

export class LotEvent extends Model<InferAttributes<LotEvent>, InferCreationAttributes<LotEvent>> {
  declare id: string;
  declare lotId: string;
  declare act: string;
  declare actorKind: 'seller' | 'buyer' | 'desk' | 'house';
  declare actorId: CreationOptional<string | null>;
  declare at: Date;
  declare fromState: CreationOptional<string | null>;
  declare toState: CreationOptional<string | null>;
  declare detail: JsonValue;
  declare createdAt: CreationOptional<Date>;
}

LotEvent.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    lotId: { type: DataTypes.CHAR(36), allowNull: false },
    act: { type: DataTypes.STRING(40), allowNull: false },
    actorKind: { type: DataTypes.STRING(32), allowNull: false },
    actorId: { type: DataTypes.CHAR(36) },
    at: { type: DataTypes.DATE(3), allowNull: false },
    fromState: { type: DataTypes.STRING(32) },
    toState: { type: DataTypes.STRING(32) },
    detail: { type: DataTypes.JSON, allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'lot_events', modelName: 'LotEvent', updatedAt: false },
);
