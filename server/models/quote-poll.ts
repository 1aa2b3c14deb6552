import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { type JsonValue } from './columns.ts';

export class QuotePoll extends Model<InferAttributes<QuotePoll>, InferCreationAttributes<QuotePoll>> {
  declare id: string;
  declare polledAt: Date;
  declare outcome: 'accepted' | 'partly' | 'refused' | 'unreachable';
  declare marketOpen: CreationOptional<boolean | null>;
  declare marketUntil: CreationOptional<Date | null>;
  declare detail: JsonValue;
  declare createdAt: CreationOptional<Date>;
}

QuotePoll.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    polledAt: { type: DataTypes.DATE(3), allowNull: false },
    outcome: { type: DataTypes.STRING(32), allowNull: false },
    marketOpen: { type: DataTypes.BOOLEAN },
    marketUntil: { type: DataTypes.DATE(3) },
    detail: { type: DataTypes.JSON, allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'quote_polls', modelName: 'QuotePoll', updatedAt: false },
);
