import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { MainsLine, Polarisation, Port, Verdict } from '@/emc/kinds';

export type RetestStatus = 'waiting' | 'scheduled' | 'measured' | 'cleared' | 'withdrawn';
export type RetestKind = 'peak' | 'floor' | 'repeat-prescan';
export type RetestReason = 'over' | 'needs-final' | 'repeat-prescan';

/** One emission of one state, port and limit line that asks for another look, or a prescan to be repeated there. */
export class Retest extends Model<InferAttributes<Retest>, InferCreationAttributes<Retest>> {
  declare id: CreationOptional<number>;
  declare publicId: string;
  declare number: string;
  declare stateId: number;
  declare port: Port;
  declare kind: RetestKind;
  declare reason: RetestReason;
  declare status: RetestStatus;
  /** Why it stands at its status. */
  declare statusReason: string;
  /** What stays of a limit line over its revisions; null for a prescan to be repeated. */
  declare lineKey: CreationOptional<string | null>;
  declare lineRevisionId: CreationOptional<number | null>;
  /** Of the worst reading, or where the prescan is to be repeated. */
  declare position: CreationOptional<Polarisation | MainsLine | null>;
  /** Every position where it asks. */
  declare positions: (Polarisation | MainsLine | null)[];
  /** Those of them that are still to be measured. */
  declare waitsAt: CreationOptional<(Polarisation | MainsLine | null)[]>;
  /** Where it is found again; the shown reading may lie beside it. */
  declare fromHz: CreationOptional<number | null>;
  declare toHz: CreationOptional<number | null>;
  /** Two emissions nearer than half the sum of their spacings are one. */
  declare spacingHz: CreationOptional<number | null>;
  declare frequencyHz: CreationOptional<number | null>;
  declare level: CreationOptional<number | null>;
  declare limit: CreationOptional<number | null>;
  declare marginDb: CreationOptional<number | null>;
  declare uncertaintyDb: CreationOptional<number | null>;
  declare verdict: CreationOptional<Verdict | null>;
  declare because: CreationOptional<string | null>;
  declare heightM: CreationOptional<number | null>;
  declare azimuthDeg: CreationOptional<number | null>;
  declare sweepId: CreationOptional<number | null>;
  /** The newest final that speaks of it. */
  declare finalId: CreationOptional<number | null>;
  /** The item of the state before that it was carried from. */
  declare originId: CreationOptional<number | null>;
  /** The state it was carried on to. */
  declare carriedTo: CreationOptional<number | null>;
  declare scheduledOn: CreationOptional<string | null>;
  declare note: CreationOptional<string | null>;
  /** Set while a person's withdrawal holds, with what was read then. */
  declare withdrawnBy: CreationOptional<number | null>;
  declare withdrawnMarginDb: CreationOptional<number | null>;
  declare withdrawnVerdict: CreationOptional<Verdict | null>;
  declare openedAt: Date;
  declare version: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare updatedAt: CreationOptional<Date>;
}

const VERDICT = ['over', 'needs-final', 'inconclusive', 'not-covered', 'under'];

export function defineRetest(sequelize: Sequelize): void {
  const id = { type: DataTypes.BIGINT.UNSIGNED, allowNull: true };
  const figure = { type: DataTypes.DOUBLE, allowNull: true };
  Retest.init(
    {
      id: { type: DataTypes.BIGINT.UNSIGNED, autoIncrement: true, primaryKey: true, allowNull: false },
      publicId: { type: DataTypes.CHAR(16), field: 'public_id', allowNull: false },
      number: { type: DataTypes.STRING(20), allowNull: false },
      stateId: { type: DataTypes.BIGINT.UNSIGNED, field: 'state_id', allowNull: false },
      port: { type: DataTypes.ENUM('enclosure', 'ac-mains', 'wired-network'), allowNull: false },
      kind: { type: DataTypes.ENUM('peak', 'floor', 'repeat-prescan'), allowNull: false },
      reason: { type: DataTypes.ENUM('over', 'needs-final', 'repeat-prescan'), allowNull: false },
      status: {
        type: DataTypes.ENUM('waiting', 'scheduled', 'measured', 'cleared', 'withdrawn'),
        allowNull: false,
      },
      statusReason: { type: DataTypes.STRING(400), field: 'status_reason', allowNull: false },
      lineKey: { type: DataTypes.STRING(60), field: 'line_key', allowNull: true },
      lineRevisionId: { ...id, field: 'line_revision_id' },
      position: { type: DataTypes.ENUM('horizontal', 'vertical', 'L', 'N', 'L1', 'L2', 'L3'), allowNull: true },
      positions: { type: DataTypes.JSON, allowNull: false },
      waitsAt: { type: DataTypes.JSON, field: 'waits_at', allowNull: false, defaultValue: [] },
      fromHz: { ...figure, field: 'from_hz' },
      toHz: { ...figure, field: 'to_hz' },
      spacingHz: { ...figure, field: 'spacing_hz' },
      frequencyHz: { ...figure, field: 'frequency_hz' },
      level: { ...figure },
      limit: { ...figure },
      marginDb: { ...figure, field: 'margin_db' },
      uncertaintyDb: { ...figure, field: 'uncertainty_db' },
      verdict: { type: DataTypes.ENUM(...VERDICT), allowNull: true },
      because: { type: DataTypes.STRING(300), allowNull: true },
      heightM: { ...figure, field: 'height_m' },
      azimuthDeg: { ...figure, field: 'azimuth_deg' },
      sweepId: { ...id, field: 'sweep_id' },
      finalId: { ...id, field: 'final_id' },
      originId: { ...id, field: 'origin_id' },
      carriedTo: { ...id, field: 'carried_to' },
      scheduledOn: { type: DataTypes.DATEONLY, field: 'scheduled_on', allowNull: true },
      note: { type: DataTypes.STRING(300), allowNull: true },
      withdrawnBy: { ...id, field: 'withdrawn_by' },
      withdrawnMarginDb: { ...figure, field: 'withdrawn_margin_db' },
      withdrawnVerdict: { type: DataTypes.ENUM(...VERDICT), field: 'withdrawn_verdict', allowNull: true },
      openedAt: { type: DataTypes.DATE(3), field: 'opened_at', allowNull: false },
      version: { type: DataTypes.INTEGER.UNSIGNED, allowNull: false, defaultValue: 1 },
      createdAt: { type: DataTypes.DATE(3), field: 'created_at', allowNull: false },
      updatedAt: { type: DataTypes.DATE(3), field: 'updated_at', allowNull: false },
    },
    { sequelize, modelName: 'Retest', tableName: 'retests', timestamps: true },
  );
}
