/** API tokens. The token itself is told once and never stored. */
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
import type { TokenScope } from '@/shared/contracts/roles';
import type { User, Workspace } from './accounts';
import { bind, idColumn } from './base';

export class ApiToken extends Model<InferAttributes<ApiToken>, InferCreationAttributes<ApiToken>> {
  declare id: CreationOptional<string>;
  declare workspaceId: ForeignKey<string>;
  declare createdById: ForeignKey<string>;
  declare name: string;
  declare prefix: string;
  /** SHA-256 of the token. */
  declare tokenHash: string;
  declare scopes: TokenScope[];
  /** Null: never. */
  declare expiresAt: Date | null;
  declare lastUsedAt: CreationOptional<Date | null>;
  declare lastUsedFrom: CreationOptional<string | null>;
  declare revokedAt: CreationOptional<Date | null>;
  declare createdAt: CreationOptional<Date>;
  declare createdBy?: NonAttribute<User>;
  declare workspace?: NonAttribute<Workspace>;
}

export const bindApiToken = (sequelize: Sequelize) =>
  bind(ApiToken, sequelize, 'api_tokens', {
    id: idColumn,
    workspaceId: DataTypes.UUID,
    createdById: DataTypes.UUID,
    name: DataTypes.TEXT,
    prefix: DataTypes.TEXT,
    tokenHash: DataTypes.TEXT,
    scopes: DataTypes.JSONB,
    expiresAt: DataTypes.DATE,
    lastUsedAt: DataTypes.DATE,
    lastUsedFrom: DataTypes.TEXT,
    revokedAt: DataTypes.DATE,
    createdAt: DataTypes.DATE,
  });
