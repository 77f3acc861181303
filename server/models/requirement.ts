/** Requirements, and the recordings that each is judged on. */
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
import type { Comparison, Metric, Schedule } from '@/shared/contracts/requirements';
import type { User } from './accounts';
import { bind, idColumn } from './base';
import type { Recording } from './recording';
import type { Vehicle } from './vehicle';

export class Requirement extends Model<InferAttributes<Requirement>, InferCreationAttributes<Requirement>> {
  declare id: CreationOptional<string>;
  declare workspaceId: ForeignKey<string>;
  /** Null: for every vehicle of the workspace. */
  declare vehicleId: ForeignKey<string | null>;
  declare createdById: ForeignKey<string>;
  declare name: string;
  declare metric: Metric;
  declare comparison: Comparison;
  /** In the metric's unit; null for `inside-bounds`. */
  declare limitValue: number | null;
  declare schedule: Schedule;
  declare createdAt: CreationOptional<Date>;
  declare changedAt: Date;
  declare vehicle?: NonAttribute<Vehicle | null>;
  declare createdBy?: NonAttribute<User>;
  declare recordings?: NonAttribute<RequirementRecording[]>;
}

export class RequirementRecording extends Model<
  InferAttributes<RequirementRecording>,
  InferCreationAttributes<RequirementRecording>
> {
  declare requirementId: ForeignKey<string>;
  declare recordingId: ForeignKey<string>;
  declare recording?: NonAttribute<Recording>;
}

export const bindRequirement = (sequelize: Sequelize) =>
  bind(Requirement, sequelize, 'requirements', {
    id: idColumn,
    workspaceId: DataTypes.UUID,
    vehicleId: DataTypes.UUID,
    createdById: DataTypes.UUID,
    name: DataTypes.TEXT,
    metric: DataTypes.JSONB,
    comparison: DataTypes.TEXT,
    limitValue: DataTypes.DOUBLE,
    schedule: DataTypes.JSONB,
    createdAt: DataTypes.DATE,
    changedAt: DataTypes.DATE,
  });

export const bindRequirementRecording = (sequelize: Sequelize) =>
  bind(
    RequirementRecording,
    sequelize,
    'requirement_recordings',
    {
      requirementId: { type: DataTypes.UUID, primaryKey: true },
      recordingId: { type: DataTypes.UUID, primaryKey: true },
    },
    { timestamps: false },
  );
