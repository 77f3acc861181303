/** The database as services see it: one connection pool, its models bound to it. */
import { Sequelize, type Transaction } from 'sequelize';
import type { Logger } from 'pino';
import { bindAccounts } from './accounts';
import { bindMapTemplate } from './map-template';
import { bindApiToken } from './api-token';
import { bindDiscard } from './discard';
import { bindMessages } from './messages';
import { bindParameterSet, bindSetVersion } from './parameter-set';
import { bindRecording, bindRecordingFile } from './recording';
import { bindRequirement, bindRequirementRecording } from './requirement';
import { bindRun } from './run';
import { bindVehicle } from './vehicle';
import { bindVerificationCell, bindVerificationRun, bindWaiver } from './verification';
import { bindVerificationWatch } from './verification-watch';
import { bindVersionComment } from './version-comment';

export type Database = ReturnType<typeof bindModels> & {
  sequelize: Sequelize;
  transaction<T>(work: (transaction: Transaction) => Promise<T>): Promise<T>;
  close(): Promise<void>;
};

/** Opens a pool on `url` (lazily: nothing connects until the first query). */
export function openDatabase(url: string, log: Logger): Database {
  const sequelize = new Sequelize(url, {
    dialect: 'postgres',
    logging: (sql) => log.trace({ sql }, 'query'),
    pool: { max: 12, min: 1, acquire: 8_000, idle: 30_000 },
    dialectOptions: { connectionTimeoutMillis: 5_000, keepAlive: true },
  });
  return {
    sequelize,
    ...bindModels(sequelize),
    transaction: (work) => sequelize.transaction(work),
    close: () => sequelize.close(),
  };
}

function bindModels(sequelize: Sequelize) {
  const models = {
    ...bindAccounts(sequelize),
    ...bindMessages(sequelize),
    Vehicle: bindVehicle(sequelize),
    MapTemplate: bindMapTemplate(sequelize),
    Recording: bindRecording(sequelize),
    RecordingFile: bindRecordingFile(sequelize),
    Run: bindRun(sequelize),
    ParameterSet: bindParameterSet(sequelize),
    SetVersion: bindSetVersion(sequelize),
    Requirement: bindRequirement(sequelize),
    Discard: bindDiscard(sequelize),
    ApiToken: bindApiToken(sequelize),
    VerificationRun: bindVerificationRun(sequelize),
    VerificationCell: bindVerificationCell(sequelize),
    VerificationWatch: bindVerificationWatch(sequelize),
    Waiver: bindWaiver(sequelize),
    RequirementRecording: bindRequirementRecording(sequelize),
    VersionComment: bindVersionComment(sequelize),
  };
  const { MapTemplate, Recording, RecordingFile, Run, ParameterSet, SetVersion, User, Vehicle } = models;
  MapTemplate.belongsTo(User, { as: 'createdBy', foreignKey: 'createdById' });
  Recording.belongsTo(Vehicle, { as: 'vehicle', foreignKey: 'vehicleId' });
  Recording.belongsTo(User, { as: 'createdBy', foreignKey: 'createdById' });
  Recording.hasMany(RecordingFile, { as: 'files', foreignKey: 'recordingId' });
  Run.belongsTo(Recording, { as: 'recording', foreignKey: 'recordingId' });
  Run.belongsTo(User, { as: 'createdBy', foreignKey: 'createdById' });
  ParameterSet.belongsTo(Vehicle, { as: 'vehicle', foreignKey: 'vehicleId' });
  ParameterSet.belongsTo(User, { as: 'createdBy', foreignKey: 'createdById' });
  ParameterSet.hasMany(SetVersion, { as: 'versions', foreignKey: 'setId' });
  SetVersion.belongsTo(User, { as: 'createdBy', foreignKey: 'createdById' });
  SetVersion.belongsTo(User, { as: 'submittedBy', foreignKey: 'submittedById' });
  SetVersion.belongsTo(User, { as: 'reviewedBy', foreignKey: 'reviewedById' });
  models.VersionComment.belongsTo(User, { as: 'createdBy', foreignKey: 'createdById' });
  const { Requirement, RequirementRecording, VerificationCell, VerificationRun, Waiver } = models;
  VerificationCell.belongsTo(VerificationRun, { as: 'run', foreignKey: 'verificationRunId' });
  Waiver.belongsTo(User, { as: 'createdBy', foreignKey: 'createdById' });
  Requirement.belongsTo(Vehicle, { as: 'vehicle', foreignKey: 'vehicleId' });
  Requirement.belongsTo(User, { as: 'createdBy', foreignKey: 'createdById' });
  Requirement.hasMany(RequirementRecording, { as: 'recordings', foreignKey: 'requirementId' });
  RequirementRecording.belongsTo(Recording, { as: 'recording', foreignKey: 'recordingId' });
  models.ApiToken.belongsTo(User, { as: 'createdBy', foreignKey: 'createdById' });
  models.ApiToken.belongsTo(models.Workspace, { as: 'workspace', foreignKey: 'workspaceId' });
  return models;
}
