/** Who started a verification that is still going, and is told when it ends. */
import {
  type CreationOptional,
  DataTypes,
  type ForeignKey,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import { bind } from './base';

export class VerificationWatch extends Model<
  InferAttributes<VerificationWatch>,
  InferCreationAttributes<VerificationWatch>
> {
  declare versionId: ForeignKey<string>;
  declare userId: ForeignKey<string>;
  /** Where the person reached the server: the process that ends the verification has no request to tell by. */
  declare baseUrl: string;
  declare createdAt: CreationOptional<Date>;
}

export const bindVerificationWatch = (sequelize: Sequelize) =>
  bind(VerificationWatch, sequelize, 'verification_watches', {
    versionId: { type: DataTypes.UUID, primaryKey: true },
    userId: { type: DataTypes.UUID, primaryKey: true },
    baseUrl: DataTypes.TEXT,
    createdAt: DataTypes.DATE,
  });
