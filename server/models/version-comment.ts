/** Comments on a version, or on one of its parameters. Written once, never changed. */
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
import type { User } from './accounts';
import { bind, idColumn } from './base';

export class VersionComment extends Model<
  InferAttributes<VersionComment>,
  InferCreationAttributes<VersionComment>
> {
  declare id: CreationOptional<string>;
  declare versionId: ForeignKey<string>;
  declare createdById: ForeignKey<string>;
  /** Dotted path of the parameter; null: about the version as a whole. */
  declare path: string | null;
  declare text: string;
  declare createdAt: CreationOptional<Date>;
  declare createdBy?: NonAttribute<User>;
}

export const bindVersionComment = (sequelize: Sequelize) =>
  bind(VersionComment, sequelize, 'version_comments', {
    id: idColumn,
    versionId: DataTypes.UUID,
    createdById: DataTypes.UUID,
    path: DataTypes.TEXT,
    text: DataTypes.TEXT,
    createdAt: DataTypes.DATE,
  });
