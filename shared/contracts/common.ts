/** Pieces that several contracts share: ids, paging, problems (RFC 9457). */
import { z } from 'zod';

export const API_PREFIX = '/api/v1';
/** Names the workspace of a request; a person of one workspace may leave it out. */
export const WORKSPACE_HEADER = 'X-Workspace';
/** State-changing requests made with a session cookie carry this header (any value): a cross-site form cannot. */
export const CSRF_HEADER = 'X-Driftwright';

export const idSchema = z.uuid();
export const isoTimeSchema = z.iso.datetime({ offset: true });
export const nameSchema = z.string().trim().min(1, 'Give it a name.').max(120, 'At most 120 characters.');
export const vector3Schema = z.tuple([z.number(), z.number(), z.number()]);
export type Vector3 = z.infer<typeof vector3Schema>;

export const pageQuerySchema = z.object({
  limit: z.coerce.number().int().min(1).max(200).default(50),
  // Holds the last row's name where the list is sorted by it, up to four bytes a character, in base64.
  cursor: z.string().max(800).optional(),
  search: z.string().trim().max(120).optional(),
});
export type PageQuery = z.infer<typeof pageQuerySchema>;

/** Orders of a list by a field, with a minus sign for descending. */
export const listSortSchema = z.enum(['-createdAt', 'createdAt', 'name', '-name']);
export type ListSort = z.infer<typeof listSortSchema>;

/** A page of `item`s; `nextCursor` is null on the last page. */
export const pageOf = <T extends z.ZodType>(item: T) =>
  z.object({ items: z.array(item), nextCursor: z.string().nullable() });
export interface Page<T> {
  items: T[];
  nextCursor: string | null;
}

/** One field's fault: `path` is dotted (`parameters.gnss.positionScale`). */
export const fieldErrorSchema = z.object({ path: z.string(), message: z.string() });
export type FieldError = z.infer<typeof fieldErrorSchema>;

/** application/problem+json. `type` is stable and starts with `urn:driftwright:problem:`. */
export const problemSchema = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  detail: z.string(),
  instance: z.string().optional(),
  errors: z.array(fieldErrorSchema).optional(),
});
export type Problem = z.infer<typeof problemSchema>;

export const healthSchema = z.object({
  status: z.enum(['ok', 'degraded']),
  version: z.string(),
  database: z.enum(['up', 'down']),
  queue: z.enum(['up', 'down']),
});
export type Health = z.infer<typeof healthSchema>;
