/** People, workspaces and who belongs where. */
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
import type { Role } from '@/shared/contracts/roles';
import { bind, idColumn } from './base';

export class User extends Model<InferAttributes<User>, InferCreationAttributes<User>> {
  declare id: CreationOptional<string>;
  /** Lower case. */
  declare email: string;
  declare name: string;
  declare passwordHash: string;
  /** As kept; read through services/preferences.ts. */
  declare preferences: CreationOptional<object>;
  declare createdAt: CreationOptional<Date>;
  declare memberships?: NonAttribute<Membership[]>;
}

export class Workspace extends Model<InferAttributes<Workspace>, InferCreationAttributes<Workspace>> {
  declare id: CreationOptional<string>;
  declare name: string;
  /** Seeded with the invented demonstration. */
  declare demo: CreationOptional<boolean>;
  declare createdAt: CreationOptional<Date>;
}

export class Membership extends Model<InferAttributes<Membership>, InferCreationAttributes<Membership>> {
  declare workspaceId: ForeignKey<string>;
  declare userId: ForeignKey<string>;
  declare role: Role;
  declare createdAt: CreationOptional<Date>;
  declare user?: NonAttribute<User>;
  declare workspace?: NonAttribute<Workspace>;
}

export class Invitation extends Model<InferAttributes<Invitation>, InferCreationAttributes<Invitation>> {
  declare id: CreationOptional<string>;
  declare workspaceId: ForeignKey<string>;
  declare email: string;
  declare role: Role;
  declare tokenHash: string;
  declare invitedById: ForeignKey<string>;
  declare expiresAt: Date;
  declare acceptedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
  declare invitedBy?: NonAttribute<User>;
  declare workspace?: NonAttribute<Workspace>;
}

export class PasswordReset extends Model<
  InferAttributes<PasswordReset>,
  InferCreationAttributes<PasswordReset>
> {
  declare id: CreationOptional<string>;
  declare userId: ForeignKey<string>;
  declare tokenHash: string;
  declare expiresAt: Date;
  declare usedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
}

export function bindAccounts(sequelize: Sequelize) {
  const models = {
    User: bind(User, sequelize, 'users', {
      id: idColumn,
      email: DataTypes.TEXT,
      name: DataTypes.TEXT,
      passwordHash: DataTypes.TEXT,
      preferences: { type: DataTypes.JSONB, defaultValue: {} },
      createdAt: DataTypes.DATE,
    }),
    Workspace: bind(Workspace, sequelize, 'workspaces', {
      id: idColumn,
      name: DataTypes.TEXT,
      demo: { type: DataTypes.BOOLEAN, defaultValue: false },
      createdAt: DataTypes.DATE,
    }),
    Membership: bind(Membership, sequelize, 'memberships', {
      workspaceId: { type: DataTypes.UUID, primaryKey: true },
      userId: { type: DataTypes.UUID, primaryKey: true },
      role: DataTypes.TEXT,
      createdAt: DataTypes.DATE,
    }),
    Invitation: bind(Invitation, sequelize, 'invitations', {
      id: idColumn,
      workspaceId: DataTypes.UUID,
      email: DataTypes.TEXT,
      role: DataTypes.TEXT,
      tokenHash: DataTypes.TEXT,
      invitedById: DataTypes.UUID,
      expiresAt: DataTypes.DATE,
      acceptedAt: DataTypes.DATE,
      createdAt: DataTypes.DATE,
    }),
    PasswordReset: bind(PasswordReset, sequelize, 'password_resets', {
      id: idColumn,
      userId: DataTypes.UUID,
      tokenHash: DataTypes.TEXT,
      expiresAt: DataTypes.DATE,
      usedAt: DataTypes.DATE,
      createdAt: DataTypes.DATE,
    }),
  };
  models.User.hasMany(models.Membership, { as: 'memberships', foreignKey: 'userId' });
  models.Membership.belongsTo(models.User, { as: 'user', foreignKey: 'userId' });
  models.Membership.belongsTo(models.Workspace, { as: 'workspace', foreignKey: 'workspaceId' });
  models.Invitation.belongsTo(models.User, { as: 'invitedBy', foreignKey: 'invitedById' });
  models.Invitation.belongsTo(models.Workspace, { as: 'workspace', foreignKey: 'workspaceId' });
  return models;
}
