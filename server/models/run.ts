/** Runs of the filter. Their series live in the store; a row outlives them. */
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
import type { Outage, Provenance, RunState, RunSummary } from '@/shared/contracts/runs';
import type { User } from './accounts';
import { bind, idColumn } from './base';
import type { Recording } from './recording';

export class Run extends Model<InferAttributes<Run>, InferCreationAttributes<Run>> {
  declare id: CreationOptional<string>;
  declare workspaceId: ForeignKey<string>;
  declare recordingId: ForeignKey<string>;
  declare createdById: ForeignKey<string>;
  /** The open bench that asked for it; null: asked for by itself. */
  declare benchId: string | null;
  declare state: CreationOptional<RunState>;
  declare progress: CreationOptional<number>;
  declare failure: CreationOptional<string | null>;
  declare parameters: Parameters;
  /** As used: the parameters' own, or the vehicle's at that time, m. */
  declare leverArmM: Vector3;
  declare outages: Outage[];
  declare outputRateHz: number;
  declare smooth: CreationOptional<boolean>;
  declare errorBudget: CreationOptional<boolean>;
  declare hasSeries: CreationOptional<boolean>;
  declare summary: CreationOptional<RunSummary | null>;
  declare provenance: CreationOptional<Provenance | null>;
  /** The server that computes it. */
  declare instanceId: string | null;
  declare finishedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
  declare recording?: NonAttribute<Recording>;
  declare createdBy?: NonAttribute<User>;
}

export const bindRun = (sequelize: Sequelize) =>
  bind(Run, sequelize, 'runs', {
    id: idColumn,
    workspaceId: DataTypes.UUID,
    recordingId: DataTypes.UUID,
    createdById: DataTypes.UUID,
    benchId: DataTypes.UUID,
    state: { type: DataTypes.TEXT, defaultValue: 'queued' },
    progress: { type: DataTypes.DOUBLE, defaultValue: 0 },
    failure: DataTypes.TEXT,
    parameters: DataTypes.JSONB,
    leverArmM: DataTypes.JSONB,
    outages: DataTypes.JSONB,
    outputRateHz: DataTypes.DOUBLE,
    smooth: { type: DataTypes.BOOLEAN, defaultValue: false },
    errorBudget: { type: DataTypes.BOOLEAN, defaultValue: false },
    hasSeries: { type: DataTypes.BOOLEAN, defaultValue: false },
    summary: DataTypes.JSONB,
    provenance: DataTypes.JSONB,
    instanceId: DataTypes.UUID,
    finishedAt: DataTypes.DATE,
    createdAt: DataTypes.DATE,
  });
