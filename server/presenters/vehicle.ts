import type { Vehicle } from '@/shared/contracts/vehicles';
import type { CountedVehicle } from '../services/vehicles';

export const presentVehicle = ({ vehicle, recordingCount }: CountedVehicle): Vehicle => ({
  id: vehicle.id,
  name: vehicle.name,
  kind: vehicle.kind,
  leverArmM: vehicle.leverArmM,
  axes: vehicle.axes,
  sensor: vehicle.sensor ?? null,
  notes: vehicle.notes,
  createdAt: vehicle.createdAt.toISOString(),
  recordingCount,
});
