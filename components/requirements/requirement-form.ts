/** A requirement as its form holds it, flat and as typed, and the way to the contract and back. Pure. */
import { z } from 'zod';
import {
  type Metric,
  type Requirement,
  type RequirementInput,
  requirementInputSchema,
  scheduleSchema,
} from '@/shared/contracts/requirements';
import { isShare } from '@/shared/requirements/metric-words';
import { requirementFaults } from '@/shared/requirements/requirement-faults';

/** In the choice of a vehicle: every one of the workspace. */
export const ANY_VEHICLE = 'any';

const number = z.number({ error: 'Write a number.' });

/** Every field of every kind: what does not belong to the chosen kind is kept, and not sent. */
export const requirementFormSchema = z.object({
  name: z.string(),
  vehicleId: z.string(),
  kind: z.enum([
    'drift',
    'nis-mean',
    'nis-inside-share',
    'rejected-share',
    'attitude-sigma',
    'bias-convergence',
    'rmse',
  ]),
  driftQuantity: z.enum(['horizontal', 'vertical', 'velocity', 'heading']),
  afterS: number,
  statistic: z.enum(['median', 'p95', 'maximum']),
  group: z.enum(['position', 'velocity']),
  axis: z.enum(['roll', 'pitch', 'yaw', 'largest']),
  when: z.enum(['end', 'mean']),
  sensor: z.enum(['gyro', 'accel']),
  sigma: number,
  rmseQuantity: z.enum(['horizontal', 'vertical', 'position', 'velocity', 'roll', 'pitch', 'yaw']),
  comparison: z.enum(['at-most', 'at-least', 'inside-bounds']),
  /** As shown: shares in percent. */
  limit: number.optional(),
  recordingIds: z.array(z.string()),
  schedule: z.enum(['none', 'every', 'windows']),
  everyS: number,
  forS: number,
  firstAfterS: number,
  /** "600–660, 900–960", s. */
  windows: z.string(),
});
export type RequirementForm = z.infer<typeof requirementFormSchema>;

export const NEW_REQUIREMENT: RequirementForm = {
  name: '',
  vehicleId: ANY_VEHICLE,
  kind: 'drift',
  driftQuantity: 'horizontal',
  afterS: 60,
  statistic: 'p95',
  group: 'position',
  axis: 'yaw',
  when: 'end',
  sensor: 'gyro',
  sigma: 5e-5,
  rmseQuantity: 'horizontal',
  comparison: 'at-most',
  limit: undefined,
  recordingIds: [],
  schedule: 'every',
  everyS: 300,
  forS: 60,
  firstAfterS: 60,
  windows: '',
};

export function metricOf(form: RequirementForm): Metric {
  switch (form.kind) {
    case 'drift':
      return { kind: 'drift', quantity: form.driftQuantity, afterS: form.afterS, statistic: form.statistic };
    case 'attitude-sigma':
      return { kind: 'attitude-sigma', axis: form.axis, when: form.when };
    case 'bias-convergence':
      return { kind: 'bias-convergence', sensor: form.sensor, sigma: form.sigma };
    case 'rmse':
      return { kind: 'rmse', quantity: form.rmseQuantity };
    default:
      return { kind: form.kind, group: form.group };
  }
}

/** Mean NIS has bounds of its own; nothing else has. */
export const comparisonOf = ({ kind, comparison }: RequirementForm): RequirementForm['comparison'] =>
  kind === 'nis-mean' ? comparison : comparison === 'inside-bounds' ? 'at-most' : comparison;

export const limitOf = (form: RequirementForm): number | null => {
  if (comparisonOf(form) === 'inside-bounds' || form.limit === undefined) return null;
  return isShare(metricOf(form)) ? form.limit / 100 : form.limit;
};

/** Field of the form that a path of the contract is typed in. */
const FIELD_OF: Record<string, keyof RequirementForm> = {
  name: 'name',
  vehicleId: 'vehicleId',
  comparison: 'comparison',
  limit: 'limit',
  recordingIds: 'recordingIds',
  schedule: 'schedule',
  'metric.afterS': 'afterS',
  'metric.sigma': 'sigma',
  'schedule.everyS': 'everyS',
  'schedule.forS': 'forS',
  'schedule.firstAfterS': 'firstAfterS',
  'schedule.windows': 'windows',
};

/** The longest known path that `path` begins with. */
export const fieldOf = (path: string): keyof RequirementForm | null => {
  const known = Object.keys(FIELD_OF).filter((one) => path === one || path.startsWith(`${one}.`));
  const longest = known.sort((a, b) => b.length - a.length)[0];
  return longest === undefined ? null : FIELD_OF[longest]!;
};

export interface FormFault {
  field: keyof RequirementForm | null;
  message: string;
}

/** What is sent, or what is wrong with it, field by field. */
export function toInput(form: RequirementForm): { input: RequirementInput } | { faults: FormFault[] } {
  const schedule = scheduleOf(form);
  if (schedule === null)
    return {
      faults: [
        {
          field: 'windows',
          message: 'Write windows as start–end in seconds, for instance 600–660, 900–960.',
        },
      ],
    };
  const metric = metricOf(form);
  const [comparison, limit] = [comparisonOf(form), limitOf(form)];
  const parsed = requirementInputSchema.safeParse({
    name: form.name,
    vehicleId: form.vehicleId === ANY_VEHICLE ? null : form.vehicleId,
    metric,
    comparison,
    limit,
    recordingIds: form.recordingIds,
    schedule,
  });
  const told = parsed.success
    ? []
    : parsed.error.issues.map(({ path, message }) => ({ field: fieldOf(path.join('.')), message }));
  const shape = scheduleSchema.safeParse(schedule);
  // What does not hold together is told with what is missing, all at once.
  const whole = shape.success ? requirementFaults({ metric, comparison, limit, schedule: shape.data }) : [];
  const faults = [...told, ...whole.map(({ path, message }) => ({ field: fieldOf(path), message }))];
  return parsed.success && faults.length === 0 ? { input: parsed.data } : { faults };
}

function scheduleOf(form: RequirementForm): unknown {
  if (form.schedule === 'none') return { kind: 'none' };
  if (form.schedule === 'every') {
    const { everyS, forS, firstAfterS } = form;
    return { kind: 'every', everyS, forS, firstAfterS };
  }
  const windows = readSpans(form.windows);
  return windows && { kind: 'windows', windows };
}

/** "600–660, 900-960"; null where it cannot be read. */
export function readSpans(text: string): { startS: number; endS: number }[] | null {
  const spans = text
    .split(/[,;]/)
    .map((part) => part.trim())
    .filter(Boolean)
    .map((part) => /^(\d+(?:\.\d+)?)\s*(?:–|-|to)\s*(\d+(?:\.\d+)?)(?:\s*s)?$/.exec(part));
  if (spans.length === 0 || spans.some((span) => span === null)) return null;
  return spans.map((span) => ({ startS: Number(span![1]), endS: Number(span![2]) }));
}

/** The form of a requirement that there is. */
export function fromRequirement(requirement: Requirement): RequirementForm {
  const { name, vehicleId, metric, comparison, limit, recordingIds, schedule } = requirement;
  const share = isShare(metric);
  return {
    ...NEW_REQUIREMENT,
    name,
    vehicleId: vehicleId ?? ANY_VEHICLE,
    ...metricFields(metric),
    comparison,
    limit: limit === null ? undefined : share ? tidy(limit * 100) : limit,
    recordingIds,
    schedule: schedule.kind,
    ...(schedule.kind === 'every'
      ? { everyS: schedule.everyS, forS: schedule.forS, firstAfterS: schedule.firstAfterS }
      : {}),
    windows:
      schedule.kind === 'windows'
        ? schedule.windows.map(({ startS, endS }) => `${startS}–${endS}`).join(', ')
        : '',
  };
}

function metricFields(metric: Metric): Partial<RequirementForm> {
  const { kind } = metric;
  switch (metric.kind) {
    case 'drift':
      return { kind, driftQuantity: metric.quantity, afterS: metric.afterS, statistic: metric.statistic };
    case 'attitude-sigma':
      return { kind, axis: metric.axis, when: metric.when };
    case 'bias-convergence':
      return { kind, sensor: metric.sensor, sigma: metric.sigma };
    case 'rmse':
      return { kind, rmseQuantity: metric.quantity };
    default:
      return { kind, group: metric.group };
  }
}

/** Without the dust of a multiplication. */
const tidy = (value: number) => Number(value.toPrecision(9));
