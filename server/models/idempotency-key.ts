import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { type JsonValue } from './columns.ts';

export class IdempotencyKey extends Model<
  InferAttributes<IdempotencyKey>,
  InferCreationAttributes<IdempotencyKey>
> {
  declare id: string;
  declare actorId: string;
  declare operation: string;
  declare idempotencyKey: string;
  declare inputHash: string;
  declare status: number;
  declare answer: JsonValue;
  declare createdAt: CreationOptional<Date>;
}

IdempotencyKey.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    actorId: { type: DataTypes.CHAR(36), allowNull: false },
    operation: { type: DataTypes.STRING(120), allowNull: false },
    idempotencyKey: { type: DataTypes.STRING(255), allowNull: false },
    inputHash: { type: DataTypes.CHAR(64), allowNull: false },
    status: { type: DataTypes.INTEGER, allowNull: false },
    answer: { type: DataTypes.JSON, allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'idempotency_keys', modelName: 'IdempotencyKey', updatedAt: false },
);
