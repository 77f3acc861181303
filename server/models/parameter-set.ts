/** Parameter sets and their versions. A version is never changed once it has left the state of a draft. */
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
import type { Parameters } from '@/shared/contracts/parameters';
import type { VersionState } from '@/shared/contracts/parameter-sets';
import type { Outage } from '@/shared/contracts/runs';
import type { Evidence } from '@/shared/contracts/verification';
import type { User } from './accounts';
import { bind, idColumn } from './base';
import type { Vehicle } from './vehicle';

export class ParameterSet extends Model<
  InferAttributes<ParameterSet>,
  InferCreationAttributes<ParameterSet>
> {
  declare id: CreationOptional<string>;
  declare workspaceId: ForeignKey<string>;
  declare vehicleId: ForeignKey<string | null>;
  declare createdById: ForeignKey<string>;
  declare name: string;
  /** Highest number that a version was given: a discarded draft's is not given again. */
  declare lastNumber: CreationOptional<number>;
  declare createdAt: CreationOptional<Date>;
  declare vehicle?: NonAttribute<Vehicle | null>;
  declare createdBy?: NonAttribute<User>;
  declare versions?: NonAttribute<SetVersion[]>;
}

export class SetVersion extends Model<InferAttributes<SetVersion>, InferCreationAttributes<SetVersion>> {
  declare id: CreationOptional<string>;
  declare setId: ForeignKey<string>;
  declare number: number;
  declare state: CreationOptional<VersionState>;
  declare note: string;
  declare parameters: Parameters;
  declare outages: Outage[];
  declare runId: ForeignKey<string | null>;
  declare recordingId: ForeignKey<string | null>;
  declare parentNumber: number | null;
  declare createdById: ForeignKey<string>;
  /** The verification as it stood when it was released. */
  declare evidence: CreationOptional<Evidence | null>;
  declare submittedById: CreationOptional<ForeignKey<string | null>>;
  declare submittedAt: CreationOptional<Date | null>;
  /** The vehicle that it was released for. */
  declare vehicleId: CreationOptional<ForeignKey<string | null>>;
  declare reviewComment: CreationOptional<string | null>;
  declare reviewedById: ForeignKey<string | null>;
  declare reviewedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
  declare createdBy?: NonAttribute<User>;
  declare submittedBy?: NonAttribute<User | null>;
  declare reviewedBy?: NonAttribute<User | null>;
}

export const bindParameterSet = (sequelize: Sequelize) =>
  bind(ParameterSet, sequelize, 'parameter_sets', {
    id: idColumn,
    workspaceId: DataTypes.UUID,
    vehicleId: DataTypes.UUID,
    createdById: DataTypes.UUID,
    name: DataTypes.TEXT,
    lastNumber: { type: DataTypes.INTEGER, defaultValue: 0 },
    createdAt: DataTypes.DATE,
  });

export const bindSetVersion = (sequelize: Sequelize) =>
  bind(SetVersion, sequelize, 'set_versions', {
    id: idColumn,
    setId: DataTypes.UUID,
    number: DataTypes.INTEGER,
    state: { type: DataTypes.TEXT, defaultValue: 'draft' },
    note: DataTypes.TEXT,
    parameters: DataTypes.JSONB,
    outages: DataTypes.JSONB,
    runId: DataTypes.UUID,
    recordingId: DataTypes.UUID,
    parentNumber: DataTypes.INTEGER,
    createdById: DataTypes.UUID,
    evidence: DataTypes.JSONB,
    submittedById: DataTypes.UUID,
    submittedAt: DataTypes.DATE,
    vehicleId: DataTypes.UUID,
    reviewComment: DataTypes.TEXT,
    reviewedById: DataTypes.UUID,
    reviewedAt: DataTypes.DATE,
    createdAt: DataTypes.DATE,
  });
