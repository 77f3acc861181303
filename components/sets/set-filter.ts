/** What the list of parameter sets can be narrowed down by, as parameters of the page's address and as the API's query. */
import { ORDERS } from '@/components/lists/orders';
import type { FilterChoice } from '@/components/lists/ListFilter';
import type { SetFilter } from '@/hooks/parameter-sets';
import { idSchema, listSortSchema } from '@/shared/contracts/common';
import { versionStateSchema } from '@/shared/contracts/parameter-sets';
import type { Vehicle } from '@/shared/contracts/vehicles';
import { VERSION_STATES } from './version-words';

export const SET_KEYS = ['q', 'vehicle', 'state', 'sort'] as const;
export type SetKey = (typeof SET_KEYS)[number];

/** An address may be written by hand: what it says wrongly is left out. */
export function setQuery(values: Partial<Record<SetKey, string>>): SetFilter {
  return {
    search: values.q?.slice(0, 120),
    vehicleId: idSchema.safeParse(values.vehicle).data,
    state: versionStateSchema.safeParse(values.state).data,
    sort: listSortSchema.safeParse(values.sort).data,
  };
}

export const setChoices = (vehicles: readonly Vehicle[]): FilterChoice<SetKey>[] => [
  {
    key: 'vehicle',
    label: 'Vehicle',
    any: 'Any vehicle',
    options: vehicles.map(({ id, name }) => ({ value: id, label: name })),
  },
  {
    key: 'state',
    label: 'With a version that is',
    any: 'Any state',
    options: versionStateSchema.options.map((state) => ({ value: state, label: VERSION_STATES[state].word })),
  },
  { key: 'sort', label: 'Order', any: 'Newest first', options: ORDERS },
];
