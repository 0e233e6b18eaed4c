import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
  type Transaction,
} from 'sequelize';
import type { Caution, Feeding } from '../../shared/contracts/common';
import type { Day } from '../../shared/domain/day';

export class Household extends Model<
  InferAttributes<Household>,
  InferCreationAttributes<Household>
> {
  declare id: CreationOptional<number>;
  declare siteId: number;
  declare travelMinutes: number;
  declare readyMinutes: CreationOptional<number>;
  declare createdAt: Date;
}

export class Child extends Model<InferAttributes<Child>, InferCreationAttributes<Child>> {
  declare id: CreationOptional<number>;
  declare householdId: number;
  declare fullName: string;
  declare callMe: string;
  declare familyLabel: string;
  declare bornOn: Day;
  declare recordNumber: string | null;
  declare feeding: Feeding;
  declare cautions: readonly Caution[];
  declare version: CreationOptional<number>;
  declare createdAt: Date;

  /** The same child: the same record number, or the same birth date and name (accents and case do not count). */
  static alreadyKnown(
    child: Pick<Child, 'fullName' | 'bornOn' | 'recordNumber'>,
    transaction?: Transaction,
  ): Promise<Child | null> {
    const { fullName, bornOn, recordNumber } = child;
    return Child.findOne({ where: { fullName, bornOn }, transaction }).then(
      (known) =>
        known ?? (recordNumber ? Child.findOne({ where: { recordNumber }, transaction }) : null),
    );
  }
}

export function initChildModels(db: Sequelize): void {
  Household.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, primaryKey: true, autoIncrement: true },
      siteId: { type: DataTypes.INTEGER, allowNull: false },
      travelMinutes: { type: DataTypes.SMALLINT, allowNull: false },
      readyMinutes: { type: DataTypes.SMALLINT, allowNull: false, defaultValue: 30 },
      createdAt: { type: DataTypes.DATE(3), allowNull: false },
    },
    { sequelize: db, tableName: 'households' },
  );
  Child.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, primaryKey: true, autoIncrement: true },
      householdId: { type: DataTypes.BIGINT.UNSIGNED, allowNull: false },
      fullName: { type: DataTypes.STRING(160), allowNull: false },
      callMe: { type: DataTypes.STRING(80), allowNull: false },
      familyLabel: { type: DataTypes.STRING(40), allowNull: false },
      bornOn: { type: DataTypes.DATEONLY, allowNull: false },
      recordNumber: { type: DataTypes.STRING(40) },
      feeding: {
        type: DataTypes.ENUM('breast', 'formula', 'breast-and-formula', 'family-food'),
        allowNull: false,
      },
      cautions: { type: DataTypes.JSON, allowNull: false },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
      createdAt: { type: DataTypes.DATE(3), allowNull: false },
    },
    { sequelize: db, tableName: 'children' },
  );
}
