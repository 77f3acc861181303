/** API tokens: a build, or a logger in the field, acts in one workspace within the scopes that an admin gave it. */
import { z } from 'zod';
import { idSchema, isoTimeSchema, nameSchema } from './common';
import { tokenScopeSchema } from './roles';

export const tokenCreateSchema = z.object({
  name: nameSchema.describe('Its actions are audited under it.'),
  scopes: z
    .array(tokenScopeSchema)
    .min(1, 'Choose at least one scope.')
    .refine((scopes) => new Set(scopes).size === scopes.length, { message: 'A scope is named twice.' }),
  expiresInDays: z
    .number()
    .int()
    .min(1)
    .max(3650)
    .nullable()
    .default(365)
    .describe('Null: it does not expire.'),
});
export type TokenCreate = z.infer<typeof tokenCreateSchema>;
export type TokenCreateInput = z.input<typeof tokenCreateSchema>;

export const tokenSchema = z.object({
  id: idSchema,
  name: z.string(),
  prefix: z.string().describe('How the token begins, to tell it from others.'),
  scopes: z.array(tokenScopeSchema),
  state: z.enum(['active', 'expired', 'revoked']),
  createdAt: isoTimeSchema,
  createdBy: z.string(),
  expiresAt: isoTimeSchema.nullable(),
  lastUsedAt: isoTimeSchema.nullable().describe('To the minute.'),
  lastUsedFrom: z.string().nullable().describe('Address of the caller.'),
  revokedAt: isoTimeSchema.nullable(),
});
export type Token = z.infer<typeof tokenSchema>;

/** The answer to POST /tokens: the only time that the token itself is told. Sent as `Authorization: Bearer <token>`. */
export const tokenCreatedSchema = tokenSchema.extend({ token: z.string() });
export type TokenCreated = z.infer<typeof tokenCreatedSchema>;
