/** Outgoing mail as a queue, the local sink's letters, and the audit trail. */
import {
  type CreationOptional,
  DataTypes,
  type ForeignKey,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import { bind, idColumn } from './base';

export class MailMessage extends Model<InferAttributes<MailMessage>, InferCreationAttributes<MailMessage>> {
  declare id: CreationOptional<string>;
  /** Whose work it tells of; null: of a person’s account. */
  declare workspaceId: CreationOptional<ForeignKey<string | null>>;
  declare recipient: string;
  declare subject: string;
  declare text: string;
  declare html: string;
  declare state: CreationOptional<'waiting' | 'sent' | 'failed'>;
  declare attempts: CreationOptional<number>;
  declare dueAt: Date;
  declare lastError: CreationOptional<string | null>;
  declare createdAt: CreationOptional<Date>;
}

export class SinkLetter extends Model<InferAttributes<SinkLetter>, InferCreationAttributes<SinkLetter>> {
  declare id: CreationOptional<string>;
  /** Of the message that arrived, where it is one of ours. */
  declare workspaceId: CreationOptional<ForeignKey<string | null>>;
  declare recipient: string;
  declare subject: string;
  declare text: string;
  declare createdAt: CreationOptional<Date>;
}

export class AuditEntry extends Model<InferAttributes<AuditEntry>, InferCreationAttributes<AuditEntry>> {
  declare id: CreationOptional<string>;
  declare workspaceId: ForeignKey<string>;
  /** Null: the server itself. */
  declare actorId: ForeignKey<string | null>;
  /** Kept as it was then. */
  declare actorName: string;
  declare action: string;
  declare subject: string;
  /** Id of what it was done to; there is no foreign key: the entry outlives it. */
  declare subjectId: CreationOptional<string | null>;
  declare detail: Record<string, unknown>;
  declare address: string | null;
  declare createdAt: CreationOptional<Date>;
}

export function bindMessages(sequelize: Sequelize) {
  return {
    MailMessage: bind(MailMessage, sequelize, 'mail_messages', {
      id: idColumn,
      workspaceId: DataTypes.UUID,
      recipient: DataTypes.TEXT,
      subject: DataTypes.TEXT,
      text: DataTypes.TEXT,
      html: DataTypes.TEXT,
      state: { type: DataTypes.TEXT, defaultValue: 'waiting' },
      attempts: { type: DataTypes.INTEGER, defaultValue: 0 },
      dueAt: DataTypes.DATE,
      lastError: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
    }),
    SinkLetter: bind(SinkLetter, sequelize, 'sink_messages', {
      id: idColumn,
      workspaceId: DataTypes.UUID,
      recipient: DataTypes.TEXT,
      subject: DataTypes.TEXT,
      text: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
    }),
    AuditEntry: bind(AuditEntry, sequelize, 'audit_entries', {
      id: idColumn,
      workspaceId: DataTypes.UUID,
      actorId: DataTypes.UUID,
      actorName: DataTypes.TEXT,
      action: DataTypes.TEXT,
      subject: DataTypes.TEXT,
      subjectId: DataTypes.UUID,
      detail: DataTypes.JSONB,
      address: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
    }),
  };
}
