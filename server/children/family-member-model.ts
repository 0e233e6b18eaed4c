import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';

/** An adult around the children of a household: how to reach and how to speak with. */
export class FamilyMember extends Model<
  InferAttributes<FamilyMember>,
  InferCreationAttributes<FamilyMember>
> {
  declare id: CreationOptional<number>;
  declare householdId: number;
  declare fullName: string;
  /** E.164. */
  declare phone: string | null;
  declare email: string | null;
  declare readsLanguage: string;
  declare readsHow: 'well' | 'little' | 'no';
  declare speaksLanguage: string;
  declare needsInterpreter: boolean;
  declare version: CreationOptional<number>;
  declare createdAt: Date;
}

/** What one adult is to one child: guardian or helper, and on what basis. */
export class ChildFamilyMember extends Model<
  InferAttributes<ChildFamilyMember>,
  InferCreationAttributes<ChildFamilyMember>
> {
  declare childId: number;
  declare familyMemberId: number;
  declare standing: 'guardian' | 'helper';
  declare relationship: string;
  declare legalBasis: string | null;
  declare mayConsent: boolean;
  declare seesResults: boolean;
}

export function initFamilyMemberModels(db: Sequelize): void {
  FamilyMember.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, primaryKey: true, autoIncrement: true },
      householdId: { type: DataTypes.BIGINT.UNSIGNED, allowNull: false },
      fullName: { type: DataTypes.STRING(160), allowNull: false },
      phone: { type: DataTypes.STRING(20) },
      email: { type: DataTypes.STRING(254) },
      readsLanguage: { type: DataTypes.STRING(20), allowNull: false },
      readsHow: { type: DataTypes.ENUM('well', 'little', 'no'), allowNull: false },
      speaksLanguage: { type: DataTypes.STRING(60), allowNull: false },
      needsInterpreter: { type: DataTypes.BOOLEAN, allowNull: false },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
      createdAt: { type: DataTypes.DATE(3), allowNull: false },
    },
    { sequelize: db, tableName: 'family_members' },
  );
  ChildFamilyMember.init(
    {
      childId: { type: DataTypes.BIGINT.UNSIGNED, primaryKey: true },
      familyMemberId: { type: DataTypes.BIGINT.UNSIGNED, primaryKey: true },
      standing: { type: DataTypes.ENUM('guardian', 'helper'), allowNull: false },
      relationship: { type: DataTypes.STRING(60), allowNull: false },
      legalBasis: { type: DataTypes.STRING(120) },
      mayConsent: { type: DataTypes.BOOLEAN, allowNull: false },
      seesResults: { type: DataTypes.BOOLEAN, allowNull: false },
    },
    { sequelize: db, tableName: 'child_family_members' },
  );
}
