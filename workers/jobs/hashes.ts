/** Hashes that make a run traceable: the same content gives the same hash, whatever the order of its keys. */
import { createHash } from 'node:crypto';

/** JSON with the keys of every object in order; what is undefined is left out, as in JSON. */
export function canonicalJson(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map((item) => canonicalJson(item ?? null)).join(',')}]`;
  if (value === null || typeof value !== 'object') return JSON.stringify(value) ?? 'null';
  const entries = Object.entries(value)
    .filter(([, item]) => item !== undefined)
    .sort(([a], [b]) => (a < b ? -1 : 1))
    .map(([key, item]) => `${JSON.stringify(key)}:${canonicalJson(item)}`);
  return `{${entries.join(',')}}`;
}

export const sha256OfJson = (value: unknown) =>
  createHash('sha256').update(canonicalJson(value)).digest('hex');
