/** Sign-in, the first admin, invitations, password reset, members. */
import { z } from 'zod';
import { idSchema, isoTimeSchema, nameSchema, pageQuerySchema } from './common';
import { preferencesSchema } from './preferences';
import { roleSchema } from './roles';

export const emailSchema = z
  .string()
  .trim()
  .toLowerCase()
  .max(254)
  .pipe(z.email('Write an e-mail address like name@example.org.'));
export const passwordSchema = z
  .string()
  .min(10, 'At least 10 characters.')
  .max(200, 'At most 200 characters.');

export const signInSchema = z.object({
  email: emailSchema,
  password: z.string().min(1, 'Enter the password.').max(200),
});
export type SignIn = z.infer<typeof signInSchema>;

/** Makes the first admin and workspace; answered 409 once anybody exists. */
export const firstAdminSchema = z.object({
  email: emailSchema,
  password: passwordSchema,
  name: nameSchema,
  workspaceName: nameSchema,
});
export type FirstAdmin = z.infer<typeof firstAdminSchema>;

/** GET /installation: what the sign-in page must know before anybody signs in. */
export const installationSchema = z.object({
  needsFirstAdmin: z.boolean(),
  demo: z.boolean().describe('The seeded demo is present.'),
  demoPeople: z.array(
    z.object({ email: z.string(), name: z.string(), role: roleSchema, password: z.string() }),
  ),
  mailSink: z.boolean().describe('Mail goes to the local sink; an admin reads it in the app.'),
});
export type Installation = z.infer<typeof installationSchema>;

export const meSchema = z.object({
  user: z.object({ id: idSchema, email: z.string(), name: z.string() }),
  preferences: preferencesSchema,
  workspaces: z.array(z.object({ id: idSchema, name: z.string(), role: roleSchema })),
});
export type Me = z.infer<typeof meSchema>;

/** GET /sessions: where the person is signed in. */
export const signedInSessionSchema = z.object({
  id: z.string().describe('Names the session; opens nothing.'),
  current: z.boolean().describe('The one that asks.'),
  startedAt: isoTimeSchema.nullable(),
  seenAt: isoTimeSchema.nullable().describe('To ten minutes.'),
  address: z.string().nullable().describe('Where it began from.'),
  browser: z.string().nullable().describe('As the browser names itself.'),
});
export type SignedInSession = z.infer<typeof signedInSessionSchema>;

export const resetRequestSchema = z.object({ email: emailSchema });
export const resetSchema = z.object({ token: z.string().min(20).max(200), password: passwordSchema });
export type PasswordReset = z.infer<typeof resetSchema>;

export const invitationCreateSchema = z.object({ email: emailSchema, role: roleSchema });
export type InvitationCreate = z.infer<typeof invitationCreateSchema>;
export const invitationSchema = z.object({
  id: idSchema,
  email: z.string(),
  role: roleSchema,
  invitedBy: z.string(),
  createdAt: isoTimeSchema,
  expiresAt: isoTimeSchema,
});
export type Invitation = z.infer<typeof invitationSchema>;
/** GET /invitations/:token (no sign-in): whose invitation this is. */
export const invitationPreviewSchema = z.object({
  email: z.string(),
  role: roleSchema,
  workspaceName: z.string(),
  hasAccount: z.boolean(),
});
export type InvitationPreview = z.infer<typeof invitationPreviewSchema>;
/** POST /invitations/:token/accept. A person who already has an account gives its password. */
export const invitationAcceptSchema = z.object({ name: nameSchema.optional(), password: passwordSchema });
export type InvitationAccept = z.infer<typeof invitationAcceptSchema>;

export const memberSchema = z.object({
  userId: idSchema,
  name: z.string(),
  email: z.string(),
  role: roleSchema,
  joinedAt: isoTimeSchema,
});
export type Member = z.infer<typeof memberSchema>;
/** POST /workspace/leave: said on purpose. */
export const workspaceLeaveSchema = z.object({ confirm: z.literal(true) });
/** POST /workspace/delete: its name, typed; all of its data go with it. */
export const workspaceDeleteSchema = z.object({ name: z.string().max(200) });

export const memberPatchSchema = z.object({ role: roleSchema });

/** A message held by the local mail sink (GET /mail, admins only). */
export const sinkMessageSchema = z.object({
  id: idSchema,
  to: z.string(),
  subject: z.string(),
  text: z.string(),
  sentAt: isoTimeSchema,
});
export type SinkMessage = z.infer<typeof sinkMessageSchema>;

/** A letter that has not left yet (GET /mail/queue, admins only). What it says is its recipient’s alone. */
export const queuedLetterSchema = z.object({
  id: idSchema,
  to: z.string(),
  subject: z.string(),
  state: z.enum(['waiting', 'failed']).describe('failed: given up after three days of trying.'),
  attempts: z.number().int(),
  lastError: z.string().nullable().describe('What the mail server, or the way to it, answered last.'),
  nextTryAt: isoTimeSchema.nullable().describe('Null: none, it was given up.'),
  writtenAt: isoTimeSchema,
});
export type QueuedLetter = z.infer<typeof queuedLetterSchema>;
/** POST /mail/queue/retry: the letter to try at once; left out: all that have not left. */
export const letterRetrySchema = z.strictObject({ id: idSchema.optional() });

/** What GET /audit and /audit.csv are narrowed by. */
export const auditFilterSchema = z.object({
  action: z
    .string()
    .max(60)
    .regex(/^[a-z-]+\.([a-z-]+)?$/, 'An action like version.released, or all of a kind like version.')
    .optional()
    .describe('version.released; version. for all of its kind.'),
  actorId: idSchema.optional().describe('The person.'),
  subjectId: idSchema.optional().describe('What it was done to.'),
  from: isoTimeSchema.optional().describe('Not before.'),
  to: isoTimeSchema.optional().describe('Before.'),
  search: z.string().trim().max(120).optional().describe('In action, subject or name.'),
});
export type AuditFilter = z.infer<typeof auditFilterSchema>;
export const auditQuerySchema = pageQuerySchema.extend(auditFilterSchema.shape);
export type AuditQuery = z.infer<typeof auditQuerySchema>;

export const auditEntrySchema = z.object({
  id: idSchema,
  at: isoTimeSchema,
  actor: z.string(),
  actorId: idSchema.nullable().describe('Null: a token, the server itself, or an account that is gone.'),
  action: z.string(),
  subject: z.string(),
  subjectId: idSchema.nullable().describe('Of what it was done to, where that has an id.'),
  address: z
    .string()
    .nullable()
    .describe('Where the request came from; left out of the history of a version.'),
  detail: z.record(z.string(), z.unknown()).describe('What it was about; `before` and `after` of a change.'),
});
export type AuditEntry = z.infer<typeof auditEntrySchema>;
