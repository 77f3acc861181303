/** Vehicles. */
import {
  type CreationOptional,
  DataTypes,
  type ForeignKey,
  type InferAttributes,
  type InferCreationAttributes,
  Model,
  type Sequelize,
} from 'sequelize';
import type { Vector3 } from '@/shared/contracts/common';
import type { AxisMap, SensorModel, Vehicle as VehicleContract } from '@/shared/contracts/vehicles';
import { bind, idColumn } from './base';

export class Vehicle extends Model<InferAttributes<Vehicle>, InferCreationAttributes<Vehicle>> {
  declare id: CreationOptional<string>;
  declare workspaceId: ForeignKey<string>;
  declare name: string;
  declare kind: VehicleContract['kind'];
  /** Antenna seen from the IMU: forward, right, down, m. */
  declare leverArmM: Vector3;
  declare axes: AxisMap;
  declare sensor: CreationOptional<SensorModel | null>;
  declare notes: string;
  declare createdAt: CreationOptional<Date>;
}

export const bindVehicle = (sequelize: Sequelize) =>
  bind(Vehicle, sequelize, 'vehicles', {
    id: idColumn,
    workspaceId: DataTypes.UUID,
    name: DataTypes.TEXT,
    kind: DataTypes.TEXT,
    leverArmM: DataTypes.JSONB,
    axes: DataTypes.JSONB,
    sensor: DataTypes.JSONB,
    notes: DataTypes.TEXT,
    createdAt: DataTypes.DATE,
  });
