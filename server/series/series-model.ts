import {
  DataTypes,
  Model,
  type CreationOptional,
  type InferAttributes,
  type InferCreationAttributes,
  type Sequelize,
} from 'sequelize';
import type { MorningState } from '../../shared/contracts/common';
import type { Day } from '../../shared/domain/day';

export class Series extends Model<InferAttributes<Series>, InferCreationAttributes<Series>> {
  declare id: CreationOptional<number>;
  declare childId: number;
  declare orderId: number;
  declare siteId: number;
  /** The versions in force when the series was planned; later versions do not move its times. */
  declare fastingProtocolId: number;
  declare laboratoryProfileId: number;
  declare morningsPlanned: number;
  /** A ride has to be booked for each morning. */
  declare needsRide: CreationOptional<boolean>;
  declare state: CreationOptional<'planned' | 'collecting' | 'awaiting-results' | 'closed'>;
  declare createdByStaffId: number;
  declare createdAt: Date;
  declare closedAt: CreationOptional<Date | null>;
  declare closeReason: CreationOptional<string | null>;
  declare version: CreationOptional<number>;
}

/** One planned collection. */
export class Morning extends Model<InferAttributes<Morning>, InferCreationAttributes<Morning>> {
  declare id: CreationOptional<number>;
  declare seriesId: number;
  declare childId: number;
  declare siteId: number;
  declare number: number;
  declare plannedOn: Day;
  declare arrivalTime: string;
  declare arrivalAt: Date;
  declare roomId: number;
  /** Unique while the morning holds its place; null once it is lost. Its number is unique as long (`held_number`). */
  declare placeKey: string | null;
  declare state: CreationOptional<MorningState>;
  declare expectedAt: CreationOptional<Date | null>;
  declare arrivedAt: CreationOptional<Date | null>;
  declare fedAt: CreationOptional<Date | null>;
  declare leftAt: CreationOptional<Date | null>;
  declare lostReason: CreationOptional<string | null>;
  declare escortFamilyMemberId: number | null;
  declare nightCarerFamilyMemberId: CreationOptional<number | null>;
  declare calendarUid: string;
  declare calendarSequence: CreationOptional<number>;
  declare version: CreationOptional<number>;
}

export function initSeriesModels(db: Sequelize): void {
  Series.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, primaryKey: true, autoIncrement: true },
      childId: { type: DataTypes.BIGINT.UNSIGNED, allowNull: false },
      orderId: { type: DataTypes.BIGINT.UNSIGNED, allowNull: false },
      siteId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      fastingProtocolId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      laboratoryProfileId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      morningsPlanned: { type: DataTypes.TINYINT.UNSIGNED, allowNull: false },
      needsRide: { type: DataTypes.BOOLEAN, allowNull: false, defaultValue: false },
      state: {
        type: DataTypes.ENUM('planned', 'collecting', 'awaiting-results', 'closed'),
        allowNull: false,
        defaultValue: 'planned',
      },
      createdByStaffId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      createdAt: { type: DataTypes.DATE(3), allowNull: false },
      closedAt: { type: DataTypes.DATE(3) },
      closeReason: { type: DataTypes.STRING(300) },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
    },
    { sequelize: db, tableName: 'series' },
  );
  Morning.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, primaryKey: true, autoIncrement: true },
      seriesId: { type: DataTypes.BIGINT.UNSIGNED, allowNull: false },
      childId: { type: DataTypes.BIGINT.UNSIGNED, allowNull: false },
      siteId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      number: { type: DataTypes.TINYINT.UNSIGNED, allowNull: false },
      plannedOn: { type: DataTypes.DATEONLY, allowNull: false },
      arrivalTime: { type: DataTypes.TIME, allowNull: false },
      arrivalAt: { type: DataTypes.DATE(3), allowNull: false },
      roomId: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false },
      placeKey: { type: DataTypes.STRING(60) },
      state: {
        type: DataTypes.ENUM('planned', 'here', 'collecting', 'collected', 'not-collected', 'lost'),
        allowNull: false,
        defaultValue: 'planned',
      },
      expectedAt: { type: DataTypes.DATE(3) },
      arrivedAt: { type: DataTypes.DATE(3) },
      fedAt: { type: DataTypes.DATE(3) },
      leftAt: { type: DataTypes.DATE(3) },
      lostReason: { type: DataTypes.STRING(200) },
      escortFamilyMemberId: { type: DataTypes.BIGINT.UNSIGNED },
      nightCarerFamilyMemberId: { type: DataTypes.BIGINT.UNSIGNED },
      calendarUid: { type: DataTypes.STRING(80), allowNull: false },
      calendarSequence: { type: DataTypes.SMALLINT.UNSIGNED, allowNull: false, defaultValue: 0 },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
    },
    { sequelize: db, tableName: 'mornings' },
  );
}
