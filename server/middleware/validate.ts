/** Checks what was sent against the contract's schema and says every fault at once. */
import type { z } from 'zod';
import type { FieldError } from '@/shared/contracts/common';
import { invalid } from '../errors';

/** The parsed value. Throws 422 with one entry a fault; `where` names the part of the request. */
export function validate<S extends z.ZodType>(schema: S, value: unknown, where: string): z.output<S> {
  const read = schema.safeParse(value ?? {});
  if (!read.success) throw faults(read.error.issues.flatMap(fieldErrors), where);
  const unknown = unknownFields(value, read.data);
  if (unknown.length > 0) throw faults(unknown, where);
  return read.data;
}

function faults(errors: FieldError[], where: string) {
  const shown = errors
    .slice(0, 3)
    .map((error) => (error.path ? `${error.path}: ${error.message}` : error.message));
  const more = errors.length > 3 ? ` … and ${errors.length - 3} more` : '';
  return invalid(`In the ${where}: ${shown.join(' · ')}${more}`, { errors });
}

function fieldErrors(issue: z.core.$ZodIssue): FieldError[] {
  return [{ path: issue.path.map(String).join('.'), message: issue.message }];
}

/**
 * Fields that the schema does not know would be dropped in silence: a mistyped parameter must not pass for the default.
 * Looks where both sides are plain objects or equally long lists.
 */
function unknownFields(given: unknown, parsed: unknown, path = ''): FieldError[] {
  if (Array.isArray(given) && Array.isArray(parsed)) {
    return given.flatMap((item, i) => unknownFields(item, parsed[i], join(path, String(i))));
  }
  if (!isPlain(given) || !isPlain(parsed)) return [];
  return Object.entries(given).flatMap(([key, value]) => {
    if (value === undefined) return [];
    if (!Object.hasOwn(parsed, key)) {
      return [{ path: join(path, key), message: 'There is no such field here; see /api/v1/openapi.json.' }];
    }
    return unknownFields(value, parsed[key], join(path, key));
  });
}

const join = (path: string, key: string) => (path ? `${path}.${key}` : key);
const isPlain = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);
