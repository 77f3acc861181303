/** Runs made to judge versions by, the cells judged by them, and waivers. */
import {
  type CreationOptional,
  DataTypes,
  type ForeignKey,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type NonAttribute,
  type Sequelize,
} from 'sequelize';
import type { Vector3 } from '@/shared/contracts/common';
import type { Parameters } from '@/shared/contracts/parameters';
import type { Comparison, Metric, Schedule } from '@/shared/contracts/requirements';
import type { Verdict } from '@/shared/contracts/verification';
import type { BiasSigma } from '@/shared/requirements/bias-sigma';
import type { User } from './accounts';
import { bind, idColumn } from './base';

/** All that the result of a run hangs on. */
export interface VerificationInputs {
  /** Over the decoded channels; null: the recording is not decoded. */
  recordingSha256: string | null;
  parametersSha256: string;
  leverArmM: Vector3;
  schedule: Schedule;
  engineVersion: string;
}

/** What a requirement asks for, apart from its name. */
export interface Definition {
  metric: Metric;
  comparison: Comparison;
  limit: number | null;
  schedule: Schedule;
}

export class VerificationRun extends Model<
  InferAttributes<VerificationRun>,
  InferCreationAttributes<VerificationRun>
> {
  declare id: CreationOptional<string>;
  declare versionId: ForeignKey<string>;
  declare recordingId: ForeignKey<string>;
  declare createdById: ForeignKey<string>;
  declare inputHash: string;
  declare inputs: VerificationInputs;
  /** The version's, at that time: a draft may be changed later. */
  declare parameters: Parameters;
  declare state: CreationOptional<'waiting' | 'running' | 'done' | 'failed'>;
  declare progress: CreationOptional<number>;
  declare failure: CreationOptional<string | null>;
  declare runId: CreationOptional<ForeignKey<string | null>>;
  declare biasSigma: CreationOptional<BiasSigma | null>;
  /** The process that computes it. */
  declare instanceId: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
  declare finishedAt: CreationOptional<Date | null>;
}

export class VerificationCell extends Model<
  InferAttributes<VerificationCell>,
  InferCreationAttributes<VerificationCell>
> {
  declare versionId: ForeignKey<string>;
  declare requirementId: ForeignKey<string>;
  declare recordingId: ForeignKey<string>;
  declare verificationRunId: ForeignKey<string>;
  declare requirementHash: string;
  declare definition: Definition;
  declare verdict: CreationOptional<Verdict | null>;
  declare value: CreationOptional<number | null>;
  declare bounds: CreationOptional<[number, number] | null>;
  declare reason: CreationOptional<string | null>;
  declare judgedAt: CreationOptional<Date | null>;
  declare run?: NonAttribute<VerificationRun>;
}

export class Waiver extends Model<InferAttributes<Waiver>, InferCreationAttributes<Waiver>> {
  declare id: CreationOptional<string>;
  declare versionId: ForeignKey<string>;
  declare requirementId: string;
  declare recordingId: string;
  /** It holds for the cell as it stood: another requirement or other inputs ask for another waiver. */
  declare requirementHash: string;
  declare inputHash: string;
  declare text: string;
  declare createdById: ForeignKey<string>;
  declare createdAt: CreationOptional<Date>;
  declare createdBy?: NonAttribute<User>;
}

export const bindVerificationRun = (sequelize: Sequelize) =>
  bind(VerificationRun, sequelize, 'verification_runs', {
    id: idColumn,
    versionId: DataTypes.UUID,
    recordingId: DataTypes.UUID,
    createdById: DataTypes.UUID,
    inputHash: DataTypes.TEXT,
    inputs: DataTypes.JSONB,
    parameters: DataTypes.JSONB,
    state: { type: DataTypes.TEXT, defaultValue: 'waiting' },
    progress: { type: DataTypes.DOUBLE, defaultValue: 0 },
    failure: DataTypes.TEXT,
    runId: DataTypes.UUID,
    biasSigma: DataTypes.JSONB,
    instanceId: DataTypes.UUID,
    createdAt: DataTypes.DATE,
    finishedAt: DataTypes.DATE,
  });

export const bindVerificationCell = (sequelize: Sequelize) =>
  bind(
    VerificationCell,
    sequelize,
    'verification_cells',
    {
      versionId: { type: DataTypes.UUID, primaryKey: true },
      requirementId: { type: DataTypes.UUID, primaryKey: true },
      recordingId: { type: DataTypes.UUID, primaryKey: true },
      verificationRunId: DataTypes.UUID,
      requirementHash: DataTypes.TEXT,
      definition: DataTypes.JSONB,
      verdict: DataTypes.TEXT,
      value: DataTypes.DOUBLE,
      bounds: DataTypes.JSONB,
      reason: DataTypes.TEXT,
      judgedAt: DataTypes.DATE,
    },
    { timestamps: false },
  );

export const bindWaiver = (sequelize: Sequelize) =>
  bind(Waiver, sequelize, 'waivers', {
    id: idColumn,
    versionId: DataTypes.UUID,
    requirementId: DataTypes.UUID,
    recordingId: DataTypes.UUID,
    requirementHash: DataTypes.TEXT,
    inputHash: DataTypes.TEXT,
    text: DataTypes.TEXT,
    createdById: DataTypes.UUID,
    createdAt: DataTypes.DATE,
  });
