/** Prefixes of the store that nothing names any more and that are still to be removed. */
import {
  type CreationOptional,
  DataTypes,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import { bind } from './base';

export class Discard extends Model<InferAttributes<Discard>, InferCreationAttributes<Discard>> {
  declare prefix: string;
  declare createdAt: CreationOptional<Date>;
}

export const bindDiscard = (sequelize: Sequelize) =>
  bind(Discard, sequelize, 'discards', {
    prefix: { type: DataTypes.TEXT, primaryKey: true },
    createdAt: DataTypes.DATE,
  });
