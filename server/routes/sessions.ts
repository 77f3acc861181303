/** Where a person is signed in. */
import { z } from 'zod';
import { signedInSessionSchema } from '@/shared/contracts/accounts';
import { pageOf } from '@/shared/contracts/common';
import { presentWhole } from '../presenters/page';
import { presentSession } from '../presenters/session';
import { endOtherSessions, endSessionOf, listSessions } from '../services/sessions';
import { personRoute, type Route } from './route';

const tag = 'Accounts';

export const sessionRoutes: Route[] = [
  personRoute({
    method: 'get',
    path: '/sessions',
    tag,
    summary: 'Where the person is signed in',
    success: {
      status: 200,
      description: 'The most recently used first',
      schema: pageOf(signedInSessionSchema),
      name: 'SessionPage',
    },
    handle: async ({ ctx, person, req }) =>
      presentWhole(await listSessions(ctx, person, req.sessionID), presentSession),
  }),
  personRoute({
    method: 'delete',
    path: '/sessions',
    tag,
    summary: 'Sign out everywhere else',
    success: { status: 204, description: 'Only this session is left' },
    handle: ({ ctx, person, req }) => endOtherSessions(ctx, person, req.sessionID),
  }),
  personRoute({
    method: 'delete',
    path: '/sessions/:id',
    tag,
    summary: 'Sign out one session',
    params: z.object({ id: z.string().min(1).max(100) }),
    success: { status: 204, description: 'Signed out' },
    handle: ({ ctx, person, req, params }) => endSessionOf(ctx, person, req.sessionID, params.id),
  }),
];
