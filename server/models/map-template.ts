/** Channel maps kept with a vehicle. */
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
import type { ChannelMap } from '@/shared/contracts/recordings';
import type { User } from './accounts';
import { bind, idColumn } from './base';

export class MapTemplate extends Model<InferAttributes<MapTemplate>, InferCreationAttributes<MapTemplate>> {
  declare id: CreationOptional<string>;
  declare workspaceId: ForeignKey<string>;
  declare vehicleId: ForeignKey<string>;
  declare createdById: ForeignKey<string>;
  declare name: string;
  declare channelMap: ChannelMap;
  declare createdAt: CreationOptional<Date>;
  declare createdBy?: NonAttribute<User>;
}

export const bindMapTemplate = (sequelize: Sequelize) =>
  bind(MapTemplate, sequelize, 'channel_map_templates', {
    id: idColumn,
    workspaceId: DataTypes.UUID,
    vehicleId: DataTypes.UUID,
    createdById: DataTypes.UUID,
    name: DataTypes.TEXT,
    channelMap: DataTypes.JSONB,
    createdAt: DataTypes.DATE,
  });
