/** Sign-in and the account itself. */
import { z } from 'zod';
import {
  firstAdminSchema,
  installationSchema,
  meSchema,
  resetRequestSchema,
  resetSchema,
  signInSchema,
} from '@/shared/contracts/accounts';
import { preferencesPatchSchema, preferencesSchema } from '@/shared/contracts/preferences';
import type { Request } from 'express';
import type { Context } from '../context';
import { limitAttempts } from '../middleware/rate-limit';
import { beginSession, endSession } from '../middleware/session';
import type { User } from '../models/accounts';
import { presentMe } from '../presenters/accounts';
import { completeReset, createFirstAdmin, loadPerson, requestReset, signIn } from '../services/accounts';
import { describeInstallation } from '../services/installation';
import { changePreferences } from '../services/preferences';
import { baseUrl } from './parts';
import { personRoute, publicRoute, type Route } from './route';

const tag = 'Accounts';
const slowly = (ctx: Context) => limitAttempts(ctx.config.signInAttempts);

/** Begins the session and answers who that is. */
export async function signedIn(ctx: Context, req: Request, user: User) {
  await beginSession(req, user.id, ctx.clock());
  const person = await loadPerson(ctx, user.id, req.ip ?? null);
  return presentMe(person!);
}

export const accountRoutes: Route[] = [
  publicRoute({
    method: 'get',
    path: '/installation',
    tag,
    summary: 'What the sign-in page must know',
    success: {
      status: 200,
      description: 'The installation',
      schema: installationSchema,
      name: 'Installation',
    },
    handle: ({ ctx }) => describeInstallation(ctx),
  }),
  publicRoute({
    method: 'post',
    path: '/installation/first-admin',
    tag,
    summary: 'Make the first admin and workspace, and sign in',
    body: firstAdminSchema,
    success: { status: 201, description: 'Signed in', schema: meSchema, name: 'Me' },
    failures: { 409: 'Somebody exists already' },
    handle: async ({ ctx, body, req }) =>
      signedIn(ctx, req, await createFirstAdmin(ctx, body, req.ip ?? null)),
  }),
  publicRoute({
    method: 'post',
    path: '/sessions',
    tag,
    summary: 'Sign in',
    body: signInSchema,
    success: { status: 201, description: 'Signed in', schema: meSchema, name: 'Me' },
    failures: { 401: 'Address and password do not belong together', 429: 'Too many attempts' },
    before: slowly,
    handle: async ({ ctx, body, req }) => signedIn(ctx, req, await signIn(ctx, body)),
  }),
  personRoute({
    method: 'delete',
    path: '/sessions/current',
    tag,
    summary: 'Sign out',
    success: { status: 204, description: 'Signed out' },
    handle: async ({ ctx, req }) => {
      const sid = req.sessionID;
      await endSession(req);
      ctx.live.endSession(sid);
    },
  }),
  personRoute({
    method: 'get',
    path: '/me',
    tag,
    summary: 'Who am I, in which workspaces',
    success: { status: 200, description: 'The signed-in person', schema: meSchema, name: 'Me' },
    handle: async ({ person }) => presentMe(person),
  }),
  personRoute({
    method: 'patch',
    path: '/me/preferences',
    tag,
    summary: 'Change what I chose for myself: display units, hints seen',
    body: preferencesPatchSchema,
    success: {
      status: 200,
      description: 'All of them',
      schema: preferencesSchema,
      name: 'Preferences',
    },
    handle: ({ ctx, person, body }) => changePreferences(ctx, person, body),
  }),
  publicRoute({
    method: 'post',
    path: '/password-resets',
    tag,
    summary: 'Ask for a reset link by e-mail',
    body: resetRequestSchema,
    success: {
      status: 202,
      description: 'If the address is known, a letter is on its way',
      schema: z.object({}),
    },
    failures: { 429: 'Too many attempts' },
    before: slowly,
    handle: async ({ ctx, body, req }) => {
      await requestReset(ctx, body.email, baseUrl(ctx.config, req));
      return {};
    },
  }),
  publicRoute({
    method: 'post',
    path: '/password-resets/complete',
    tag,
    summary: 'Set a new password by the link’s token; ends every session of the person',
    body: resetSchema,
    success: { status: 204, description: 'The password is set' },
    failures: { 404: 'The link has been used or has run out' },
    before: slowly,
    handle: async ({ ctx, body }) => {
      ctx.live.endUser(await completeReset(ctx, body));
    },
  }),
];
