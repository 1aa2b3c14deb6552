import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';

export class Quote extends Model<InferAttributes<Quote>, InferCreationAttributes<Quote>> {
  declare id: string;
  declare metal: 'Au' | 'Ag' | 'Pt' | 'Pd';
  declare usdPerTroyOunce: string;
  declare bid: CreationOptional<string | null>;
  declare ask: CreationOptional<string | null>;
  declare source: string;
  declare quotedAt: Date;
  declare acceptedAt: Date;
  declare createdAt: CreationOptional<Date>;
}

Quote.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    metal: { type: DataTypes.STRING(32), allowNull: false },
    usdPerTroyOunce: { type: DataTypes.DECIMAL(20, 8), allowNull: false },
    bid: { type: DataTypes.DECIMAL(20, 8) },
    ask: { type: DataTypes.DECIMAL(20, 8) },
    source: { type: DataTypes.STRING(60), allowNull: false },
    quotedAt: { type: DataTypes.DATE(3), allowNull: false },
    acceptedAt: { type: DataTypes.DATE(3), allowNull: false },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'quotes', modelName: 'Quote', updatedAt: false },
);
