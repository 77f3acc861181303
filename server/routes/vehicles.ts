import { pageOf } from '@/shared/contracts/common';
import {
  vehicleInputSchema,
  vehicleListQuerySchema,
  vehiclePatchSchema,
  vehicleSchema,
} from '@/shared/contracts/vehicles';
import { presentPage } from '../presenters/page';
import { presentVehicle } from '../presenters/vehicle';
import { changeVehicle, createVehicle, deleteVehicle, getVehicle, listVehicles } from '../services/vehicles';
import { idParams } from './parts';
import { type Route, workspaceRoute } from './route';

const tag = 'Vehicles';
const one = { schema: vehicleSchema, name: 'Vehicle' };

export const vehicleRoutes: Route[] = [
  workspaceRoute({
    method: 'get',
    path: '/vehicles',
    tag,
    summary: 'Vehicles of the workspace',
    permission: 'workspace:read',
    query: vehicleListQuerySchema,
    success: {
      status: 200,
      description: 'By name unless asked otherwise',
      schema: pageOf(vehicleSchema),
      name: 'VehiclePage',
    },
    handle: async ({ ctx, actor, query }) =>
      presentPage(await listVehicles(ctx, actor, query), presentVehicle),
  }),
  workspaceRoute({
    method: 'post',
    path: '/vehicles',
    tag,
    summary: 'Add a vehicle',
    permission: 'vehicle:write',
    body: vehicleInputSchema,
    success: { status: 201, description: 'The vehicle', ...one },
    failures: { 409: 'The name is taken' },
    handle: async ({ ctx, actor, body }) => presentVehicle(await createVehicle(ctx, actor, body)),
  }),
  workspaceRoute({
    method: 'get',
    path: '/vehicles/:id',
    tag,
    summary: 'One vehicle',
    permission: 'workspace:read',
    params: idParams,
    success: { status: 200, description: 'The vehicle', ...one },
    handle: async ({ ctx, actor, params }) => presentVehicle(await getVehicle(ctx, actor, params.id)),
  }),
  workspaceRoute({
    method: 'patch',
    path: '/vehicles/:id',
    tag,
    summary: 'Change a vehicle; new axes decode its recordings again',
    permission: 'vehicle:write',
    params: idParams,
    body: vehiclePatchSchema,
    success: { status: 200, description: 'The vehicle', ...one },
    failures: { 409: 'The name is taken' },
    handle: async ({ ctx, actor, params, body }) =>
      presentVehicle(await changeVehicle(ctx, actor, params.id, body)),
  }),
  workspaceRoute({
    method: 'delete',
    path: '/vehicles/:id',
    tag,
    summary: 'Delete a vehicle that nothing uses',
    permission: 'vehicle:write',
    params: idParams,
    success: { status: 204, description: 'Deleted' },
    failures: { 409: 'Recordings or parameter sets use it' },
    handle: ({ ctx, actor, params }) => deleteVehicle(ctx, actor, params.id),
  }),
];
