/** What the list of recordings can be narrowed down by, as parameters of the page's address and as the API's query. */
import { ORDERS } from '@/components/lists/orders';
import type { FilterChoice } from '@/components/lists/ListFilter';
import type { RecordingFilter } from '@/hooks/recordings';
import { idSchema, listSortSchema } from '@/shared/contracts/common';
import { recordingStatusSchema, type RecordingStatus } from '@/shared/contracts/recordings';
import type { Vehicle } from '@/shared/contracts/vehicles';

export const RECORDING_KEYS = ['q', 'vehicle', 'status', 'since', 'sort'] as const;
export type RecordingKey = (typeof RECORDING_KEYS)[number];

const DAY_MS = 86_400_000;
/** Days back, by the word in the address. */
const SPANS: Readonly<Record<string, { days: number; label: string }>> = {
  week: { days: 7, label: 'Last 7 days' },
  month: { days: 31, label: 'Last 31 days' },
  year: { days: 366, label: 'Last 12 months' },
};
const STATUS_LABELS: Record<RecordingStatus, string> = {
  ready: 'Decoded',
  decoding: 'Decoding',
  uploaded: 'Waiting for decoding',
  'needs-mapping': 'Needs mapping',
  rejected: 'Rejected',
};

/** An address may be written by hand: what it says wrongly is left out. `now` to the day, so that the query stays the same. */
export function recordingQuery(
  values: Partial<Record<RecordingKey, string>>,
  now = new Date(),
): RecordingFilter {
  const status = recordingStatusSchema.safeParse(values.status);
  const span = SPANS[values.since ?? ''];
  const midnight = new Date(now.getFullYear(), now.getMonth(), now.getDate()).getTime();
  return {
    search: values.q?.slice(0, 120),
    vehicleId: idSchema.safeParse(values.vehicle).data,
    status: status.success ? [status.data] : undefined,
    since: span ? new Date(midnight - span.days * DAY_MS).toISOString() : undefined,
    sort: listSortSchema.safeParse(values.sort).data,
  };
}

export const recordingChoices = (vehicles: readonly Vehicle[]): FilterChoice<RecordingKey>[] => [
  {
    key: 'vehicle',
    label: 'Vehicle',
    any: 'Any vehicle',
    options: vehicles.map(({ id, name }) => ({ value: id, label: name })),
  },
  {
    key: 'status',
    label: 'Status',
    any: 'Any status',
    options: Object.entries(STATUS_LABELS).map(([value, label]) => ({ value, label })),
  },
  {
    key: 'since',
    label: 'Uploaded',
    any: 'At any time',
    options: Object.entries(SPANS).map(([value, { label }]) => ({ value, label })),
  },
  { key: 'sort', label: 'Order', any: 'Newest first', options: ORDERS },
];
