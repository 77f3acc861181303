/** What the list of vehicles can be narrowed down by, as parameters of the page's address and as the API's query. */
import type { FilterChoice } from '@/components/lists/ListFilter';
import type { VehicleFilter } from '@/hooks/vehicles';
import { listSortSchema } from '@/shared/contracts/common';
import { vehicleSchema } from '@/shared/contracts/vehicles';
import { KINDS } from './vehicle-words';

export const VEHICLE_KEYS = ['q', 'kind', 'sort'] as const;
export type VehicleKey = (typeof VEHICLE_KEYS)[number];

const kindSchema = vehicleSchema.shape.kind;

/** An address may be written by hand: what it says wrongly is left out. */
export const vehicleQuery = (values: Partial<Record<VehicleKey, string>>): VehicleFilter => ({
  search: values.q?.slice(0, 120),
  kind: kindSchema.safeParse(values.kind).data,
  sort: listSortSchema.safeParse(values.sort).data,
});

export const VEHICLE_CHOICES: readonly FilterChoice<VehicleKey>[] = [
  {
    key: 'kind',
    label: 'Kind',
    any: 'Any kind',
    options: kindSchema.options.map((kind) => ({ value: kind, label: KINDS[kind] })),
  },
  {
    key: 'sort',
    label: 'Order',
    any: 'Name, A to Z',
    options: [
      { value: '-name', label: 'Name, Z to A' },
      { value: '-createdAt', label: 'Newest first' },
      { value: 'createdAt', label: 'Oldest first' },
    ],
  },
];
