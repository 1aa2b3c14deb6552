import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';

export class QuoteCandidate extends Model<
  InferAttributes<QuoteCandidate>,
  InferCreationAttributes<QuoteCandidate>
> {
  declare id: string;
  declare metal: 'Au' | 'Ag' | 'Pt' | 'Pd';
  declare usdPerTroyOunce: string;
  declare firstSeenAt: Date;
  declare polls: CreationOptional<number>;
  declare confirmations: CreationOptional<number>;
  declare adminToldAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

QuoteCandidate.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    metal: { type: DataTypes.STRING(32), allowNull: false },
    usdPerTroyOunce: { type: DataTypes.DECIMAL(20, 8), allowNull: false },
    firstSeenAt: { type: DataTypes.DATE(3), allowNull: false },
    polls: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 1 },
    confirmations: { type: DataTypes.INTEGER, allowNull: false, defaultValue: 0 },
    adminToldAt: { type: DataTypes.DATE(3) },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    updatedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'quote_candidates', modelName: 'QuoteCandidate' },
);
