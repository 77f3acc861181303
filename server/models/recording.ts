/** Recordings and the raw files they were made of. */
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
import type {
  ChannelMap,
  FilePreview,
  FileRole,
  HealthReport,
  IntakeProblem,
  RecordingStatus,
  Remedy,
  Strip,
  TimeOrigin,
} from '@/shared/contracts/recordings';
import type { Scenario } from '@/shared/contracts/scenarios';
import type { User } from './accounts';
import { bind, idColumn } from './base';
import type { Vehicle } from './vehicle';

/** A remedy with the map that was given before it; null: guessed from the headers. */
export interface AcceptedRemedy extends Remedy {
  before: ChannelMap | null;
}

export class Recording extends Model<InferAttributes<Recording>, InferCreationAttributes<Recording>> {
  declare id: CreationOptional<string>;
  declare workspaceId: ForeignKey<string>;
  declare vehicleId: ForeignKey<string | null>;
  declare createdById: ForeignKey<string>;
  declare name: string;
  declare notes: CreationOptional<string>;
  declare status: CreationOptional<RecordingStatus>;
  declare progress: CreationOptional<number>;
  declare problems: CreationOptional<IntakeProblem[]>;
  declare previews: CreationOptional<FilePreview[]>;
  /** As the uploader gave it; null: guessed from the headers. */
  declare givenMap: CreationOptional<ChannelMap | null>;
  /** In force: given, or guessed. */
  declare channelMap: CreationOptional<ChannelMap | null>;
  /** Accepted, in order; what they stood on is kept for the way back. */
  declare remedies: CreationOptional<AcceptedRemedy[]>;
  declare scenario: CreationOptional<Scenario | null>;
  declare startS: CreationOptional<number | null>;
  declare endS: CreationOptional<number | null>;
  declare hasReference: CreationOptional<boolean>;
  declare timeOrigin: CreationOptional<TimeOrigin | null>;
  declare health: CreationOptional<HealthReport | null>;
  declare strip: CreationOptional<Strip | null>;
  declare sha256: CreationOptional<string | null>;
  /** Counts mappings: a decoding job of an older one is void. */
  declare generation: CreationOptional<number>;
  /** The server that took it in hand, while it arrives or is decoded. */
  declare instanceId: CreationOptional<string | null>;
  /** Null while its files are still on their way into the store: nobody sees it before. */
  declare confirmedAt: CreationOptional<Date | null>;
  /** Set first when it is deleted, so that a kill in between can be finished later. */
  declare deletedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
  declare vehicle?: NonAttribute<Vehicle | null>;
  declare createdBy?: NonAttribute<User>;
  declare files?: NonAttribute<RecordingFile[]>;
}

export class RecordingFile extends Model<
  InferAttributes<RecordingFile>,
  InferCreationAttributes<RecordingFile>
> {
  declare recordingId: ForeignKey<string>;
  declare role: FileRole;
  /** As the uploader's machine called it. */
  declare name: string;
  declare storeKey: string;
  declare bytes: number;
  declare sha256: string;
}

export const bindRecording = (sequelize: Sequelize) =>
  bind(Recording, sequelize, 'recordings', {
    id: idColumn,
    workspaceId: DataTypes.UUID,
    vehicleId: DataTypes.UUID,
    createdById: DataTypes.UUID,
    name: DataTypes.TEXT,
    notes: { type: DataTypes.TEXT, defaultValue: '' },
    status: { type: DataTypes.TEXT, defaultValue: 'uploaded' },
    progress: { type: DataTypes.DOUBLE, defaultValue: 0 },
    problems: { type: DataTypes.JSONB, defaultValue: [] },
    previews: { type: DataTypes.JSONB, defaultValue: [] },
    givenMap: DataTypes.JSONB,
    channelMap: DataTypes.JSONB,
    remedies: { type: DataTypes.JSONB, defaultValue: [] },
    scenario: DataTypes.JSONB,
    startS: DataTypes.DOUBLE,
    endS: DataTypes.DOUBLE,
    hasReference: { type: DataTypes.BOOLEAN, defaultValue: false },
    timeOrigin: DataTypes.JSONB,
    health: DataTypes.JSONB,
    strip: DataTypes.JSONB,
    sha256: DataTypes.TEXT,
    generation: { type: DataTypes.INTEGER, defaultValue: 1 },
    instanceId: DataTypes.UUID,
    confirmedAt: DataTypes.DATE,
    deletedAt: DataTypes.DATE,
    createdAt: DataTypes.DATE,
  });

export const bindRecordingFile = (sequelize: Sequelize) =>
  bind(
    RecordingFile,
    sequelize,
    'recording_files',
    {
      recordingId: { type: DataTypes.UUID, primaryKey: true },
      role: { type: DataTypes.TEXT, primaryKey: true },
      name: DataTypes.TEXT,
      storeKey: DataTypes.TEXT,
      bytes: {
        type: DataTypes.BIGINT,
        /** The driver answers 64-bit integers as text; a file is far below 2⁵³ bytes. */
        get(this: RecordingFile) {
          return Number(this.getDataValue('bytes'));
        },
      },
      sha256: DataTypes.TEXT,
    },
    { timestamps: false },
  );
