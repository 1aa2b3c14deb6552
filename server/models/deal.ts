import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type NonAttribute,
} from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import { minorColumn } from './columns.ts';
import type { DealReceipt } from './deal-receipt.ts';
import type { Lot } from './lot.ts';
import type { Member } from './member.ts';
import type { Parcel } from './parcel.ts';
import type { Payment } from './payment.ts';
import type { Payout } from './payout.ts';
import type { Refund } from './refund.ts';

export class Deal extends Model<InferAttributes<Deal>, InferCreationAttributes<Deal>> {
  declare id: string;
  declare code: string;
  declare lotId: string;
  declare sellerId: string;
  declare buyerId: string;
  declare state:
    | 'agreed'
    | 'funded'
    | 'shipped'
    | 'delivered'
    | 'accepted'
    | 'settled'
    | 'paid_out'
    | 'lapsed'
    | 'cancelled'
    | 'contested'
    | 'returning'
    | 'returned'
    | 'exchange'
    | 'umpire'
    | 'reversed';
  declare liveLotId: CreationOptional<string | null>;
  declare priceMinor: bigint;
  declare shippingMinor: bigint;
  declare totalMinor: bigint;
  declare commissionPercent: string;
  declare commissionMinimumMinor: bigint;
  declare commissionMinor: bigint;
  declare paymentMethod: 'card' | 'bank_debit';
  declare currency: CreationOptional<string>;
  declare deliveryName: string;
  declare deliveryLine1: string;
  declare deliveryLine2: CreationOptional<string>;
  declare deliveryCity: string;
  declare deliveryPostcode: string;
  declare deliveryRegion: string;
  declare deliveryCountry: string;
  declare deliveryPhone: string;
  declare rulesVersion: string;
  declare agreedAt: Date;
  declare fundBy: Date;
  declare fundedAt: CreationOptional<Date | null>;
  declare shipBy: CreationOptional<Date | null>;
  declare shippedAt: CreationOptional<Date | null>;
  declare arriveBy: CreationOptional<Date | null>;
  declare deliveredAt: CreationOptional<Date | null>;
  declare inspectBy: CreationOptional<Date | null>;
  declare contestedAt: CreationOptional<Date | null>;
  declare contestReason: CreationOptional<string | null>;
  declare contestNote: CreationOptional<string | null>;
  declare acceptedAt: CreationOptional<Date | null>;
  declare settledAt: CreationOptional<Date | null>;
  declare paidOutAt: CreationOptional<Date | null>;
  declare endedAt: CreationOptional<Date | null>;
  declare endReason: CreationOptional<string | null>;
  declare frozenAt: CreationOptional<Date | null>;
  declare lockVersion: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
  declare lot?: NonAttribute<Lot>;
  declare seller?: NonAttribute<Member>;
  declare buyer?: NonAttribute<Member>;
  declare payment?: NonAttribute<Payment>;
  declare parcel?: NonAttribute<Parcel>;
  declare receipt?: NonAttribute<DealReceipt>;
  declare payout?: NonAttribute<Payout>;
  declare refund?: NonAttribute<Refund>;
}

Deal.init(
  {
    id: { type: DataTypes.CHAR(36), primaryKey: true, allowNull: false },
    code: { type: DataTypes.STRING(16), allowNull: false },
    lotId: { type: DataTypes.CHAR(36), allowNull: false },
    sellerId: { type: DataTypes.CHAR(36), allowNull: false },
    buyerId: { type: DataTypes.CHAR(36), allowNull: false },
    state: { type: DataTypes.STRING(32), allowNull: false },
    liveLotId: { type: DataTypes.CHAR(36) },
    priceMinor: minorColumn('priceMinor', { allowNull: false }),
    shippingMinor: minorColumn('shippingMinor', { allowNull: false }),
    totalMinor: minorColumn('totalMinor', { allowNull: false }),
    commissionPercent: { type: DataTypes.DECIMAL(8, 4), allowNull: false },
    commissionMinimumMinor: minorColumn('commissionMinimumMinor', { allowNull: false }),
    commissionMinor: minorColumn('commissionMinor', { allowNull: false }),
    paymentMethod: { type: DataTypes.STRING(32), allowNull: false },
    currency: { type: DataTypes.CHAR(3), allowNull: false, defaultValue: 'USD' },
    deliveryName: { type: DataTypes.STRING(120), allowNull: false },
    deliveryLine1: { type: DataTypes.STRING(120), allowNull: false },
    deliveryLine2: { type: DataTypes.STRING(120), allowNull: false, defaultValue: '' },
    deliveryCity: { type: DataTypes.STRING(80), allowNull: false },
    deliveryPostcode: { type: DataTypes.STRING(20), allowNull: false },
    deliveryRegion: { type: DataTypes.STRING(60), allowNull: false },
    deliveryCountry: { type: DataTypes.CHAR(2), allowNull: false },
    deliveryPhone: { type: DataTypes.STRING(40), allowNull: false },
    rulesVersion: { type: DataTypes.STRING(16), allowNull: false },
    agreedAt: { type: DataTypes.DATE(3), allowNull: false },
    fundBy: { type: DataTypes.DATE(3), allowNull: false },
    fundedAt: { type: DataTypes.DATE(3) },
    shipBy: { type: DataTypes.DATE(3) },
    shippedAt: { type: DataTypes.DATE(3) },
    arriveBy: { type: DataTypes.DATE(3) },
    deliveredAt: { type: DataTypes.DATE(3) },
    inspectBy: { type: DataTypes.DATE(3) },
    contestedAt: { type: DataTypes.DATE(3) },
    contestReason: { type: DataTypes.STRING(32) },
    contestNote: { type: DataTypes.STRING(1000) },
    acceptedAt: { type: DataTypes.DATE(3) },
    settledAt: { type: DataTypes.DATE(3) },
    paidOutAt: { type: DataTypes.DATE(3) },
    endedAt: { type: DataTypes.DATE(3) },
    endReason: { type: DataTypes.STRING(1000) },
    frozenAt: { type: DataTypes.DATE(3) },
    lockVersion: { type: DataTypes.BIGINT, allowNull: false, defaultValue: 0 },
    createdAt: { type: DataTypes.DATE(3), allowNull: false },
    updatedAt: { type: DataTypes.DATE(3), allowNull: false },
  },
  { sequelize, tableName: 'deals', modelName: 'Deal' },
);
