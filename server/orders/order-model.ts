import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';
import type { z } from 'zod';
import type { orderDetails, stopCard } from '../../shared/contracts/orders';
import type { Day } from '../../shared/domain/day';

export type StoredOrderDetails = z.output<typeof orderDetails> & {
  readonly stopCard: z.output<typeof stopCard>;
};

export class Order extends Model<InferAttributes<Order>, InferCreationAttributes<Order>> {
  declare id: CreationOptional<number>;
  declare childId: number;
  declare orderedByName: string;
  declare answerTo: string;
  declare reason: string;
  declare details: StoredOrderDetails;
  declare morningsPlanned: number;
  declare intendsToTreat: boolean;
  declare reportingDueOn: CreationOptional<Day | null>;
  declare reportedAt: CreationOptional<Date | null>;
  declare reportedByStaffId: CreationOptional<number | null>;
  declare createdByStaffId: number;
  declare createdAt: Date;
  declare signedByStaffId: CreationOptional<number | null>;
  declare signedAt: CreationOptional<Date | null>;
  declare version: CreationOptional<number>;
}

/** Consent to the procedure and to holding the child: by whom, on what basis, how and in which language. */
export class ProcedureConsent extends Model<
  InferAttributes<ProcedureConsent>,
  InferCreationAttributes<ProcedureConsent>
> {
  declare id: CreationOptional<number>;
  declare orderId: number;
  declare familyMemberId: number;
  declare legalBasis: string;
  declare how: 'in-person' | 'telephone';
  declare witness: string | null;
  declare interpreter: string | null;
  declare language: string;
  declare formVersion: string;
  declare comfortPlan: string;
  declare hasParentInRoom: boolean;
  declare givenAt: Date;
  declare recordedByStaffId: number;
}

export function initOrderModels(db: Sequelize): void {
  Order.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, primaryKey: true, autoIncrement: true },
      childId: { type: DataTypes.BIGINT.UNSIGNED, allowNull: false },
      orderedByName: { type: DataTypes.STRING(160), allowNull: false },
      answerTo: { type: DataTypes.STRING(200), allowNull: false },
      reason: { type: DataTypes.STRING(500), allowNull: false },
      details: { type: DataTypes.JSON, allowNull: false },
      morningsPlanned: { type: DataTypes.TINYINT.UNSIGNED, allowNull: false },
      intendsToTreat: { type: DataTypes.BOOLEAN, allowNull: false },
      reportingDueOn: { type: DataTypes.DATEONLY },
      reportedAt: { type: DataTypes.DATE(3) },
      reportedByStaffId: { type: DataTypes.INTEGER.UNSIGNED },
      createdByStaffId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      createdAt: { type: DataTypes.DATE(3), allowNull: false },
      signedByStaffId: { type: DataTypes.INTEGER.UNSIGNED },
      signedAt: { type: DataTypes.DATE(3) },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
    },
    { sequelize: db, tableName: 'orders' },
  );
  ProcedureConsent.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, primaryKey: true, autoIncrement: true },
      orderId: { type: DataTypes.BIGINT.UNSIGNED, allowNull: false },
      familyMemberId: { type: DataTypes.BIGINT.UNSIGNED, allowNull: false },
      legalBasis: { type: DataTypes.STRING(120), allowNull: false },
      how: { type: DataTypes.ENUM('in-person', 'telephone'), allowNull: false },
      witness: { type: DataTypes.STRING(160) },
      interpreter: { type: DataTypes.STRING(160) },
      language: { type: DataTypes.STRING(20), allowNull: false },
      formVersion: { type: DataTypes.STRING(40), allowNull: false },
      comfortPlan: { type: DataTypes.STRING(500), allowNull: false },
      hasParentInRoom: { type: DataTypes.BOOLEAN, allowNull: false },
      givenAt: { type: DataTypes.DATE(3), allowNull: false },
      recordedByStaffId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
    },
    { sequelize: db, tableName: 'procedure_consents' },
  );
}
