/** Reading and writing parameters by their dotted path, as findings and links name them. Pure. */
import { parametersSchema, type Parameters } from '@/shared/contracts/parameters';

export type ParameterValue = number | boolean | string | null | readonly number[];

/** Value at `path`; null where nothing is set. */
export function readPath(parameters: Parameters, path: string): ParameterValue {
  let at: unknown = parameters;
  for (const key of path.split('.')) at = isRecord(at) ? at[key] : undefined;
  return typeof at === 'number' || typeof at === 'boolean' || typeof at === 'string' || isNumbers(at)
    ? at
    : null;
}

/** Number at `path`; NaN where there is none. */
export function readNumber(parameters: Parameters, path: string): number {
  const value = readPath(parameters, path);
  return typeof value === 'number' ? value : NaN;
}

/** A copy with `value` at `path` (null: left out), checked by the contract. Throws where the contract refuses it. */
export function writePath(parameters: Parameters, path: string, value: ParameterValue): Parameters {
  return parametersSchema.parse(written(parameters, path.split('.'), value));
}

/** Every path at which `changed` differs from `from`, with its value there. */
export function differences(
  from: Parameters,
  changed: Parameters,
): { path: string; value: ParameterValue }[] {
  const paths = new Set([...leafPaths(from), ...leafPaths(changed)]);
  return [...paths]
    .filter((path) => JSON.stringify(readPath(from, path)) !== JSON.stringify(readPath(changed, path)))
    .sort()
    .map((path) => ({ path, value: readPath(changed, path) }));
}

export const sameParameters = (a: Parameters, b: Parameters): boolean =>
  a === b || differences(a, b).length === 0;

function leafPaths(value: unknown, prefix = ''): string[] {
  if (!isRecord(value)) return [];
  return Object.entries(value).flatMap(([key, inner]) =>
    isRecord(inner) ? leafPaths(inner, `${prefix}${key}.`) : inner === undefined ? [] : [prefix + key],
  );
}

function written(at: unknown, [key, ...rest]: string[], value: ParameterValue): Record<string, unknown> {
  const copy: Record<string, unknown> = isRecord(at) ? { ...at } : {};
  if (rest.length > 0) copy[key!] = written(copy[key!], rest, value);
  else if (value === null) delete copy[key!];
  else copy[key!] = value;
  return copy;
}

const isRecord = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);
const isNumbers = (value: unknown): value is number[] =>
  Array.isArray(value) && value.every((item) => typeof item === 'number');
