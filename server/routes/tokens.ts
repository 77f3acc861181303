/** API tokens of the workspace. */
import { pageOf } from '@/shared/contracts/common';
import { tokenCreatedSchema, tokenCreateSchema, tokenSchema } from '@/shared/contracts/tokens';
import { presentToken } from '../presenters/api-token';
import { presentWhole } from '../presenters/page';
import { createToken, listTokens, revokeToken } from '../services/api-tokens';
import { idParams } from './parts';
import { type Route, workspaceRoute } from './route';

const tag = 'Team';

export const tokenRoutes: Route[] = [
  workspaceRoute({
    method: 'get',
    path: '/tokens',
    tag,
    summary: 'API tokens of the workspace, also those that are revoked or have run out',
    permission: 'token:manage',
    success: { status: 200, description: 'Newest first', schema: pageOf(tokenSchema), name: 'TokenPage' },
    handle: async ({ ctx, actor }) =>
      presentWhole(await listTokens(ctx, actor), (row) => presentToken(row, ctx.clock())),
  }),
  workspaceRoute({
    method: 'post',
    path: '/tokens',
    tag,
    summary: 'Make a token; the answer is the only time that it is told',
    permission: 'token:manage',
    body: tokenCreateSchema,
    success: { status: 201, description: 'The token', schema: tokenCreatedSchema, name: 'TokenCreated' },
    failures: { 409: 'The name is taken' },
    handle: async ({ ctx, actor, body, res }) => {
      const { row, token } = await createToken(ctx, actor, body);
      res.setHeader('Cache-Control', 'no-store');
      return { ...presentToken(row, ctx.clock()), token };
    },
  }),
  workspaceRoute({
    method: 'delete',
    path: '/tokens/:id',
    tag,
    summary: 'Revoke a token',
    permission: 'token:manage',
    params: idParams,
    success: { status: 204, description: 'It opens nothing any more' },
    handle: ({ ctx, actor, params }) => revokeToken(ctx, actor, params.id),
  }),
];
