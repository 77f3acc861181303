/** Versions of a set: drafts, what differs between them, and the way through the review. */
import { auditEntrySchema } from '@/shared/contracts/accounts';
import { pageOf } from '@/shared/contracts/common';
import {
  releaseSchema,
  returnSchema,
  versionCreateSchema,
  versionPatchSchema,
  versionReviseSchema,
  versionSchema,
} from '@/shared/contracts/parameter-sets';
import {
  commentCreateSchema,
  differencesQuerySchema,
  differencesSchema,
  versionCommentSchema,
} from '@/shared/contracts/version-reviews';
import { presentWhole } from '../presenters/page';
import { presentVersion } from '../presenters/parameter-set';
import { presentComment, presentHistoryEntry } from '../presenters/version-review';
import { releaseVersion, returnVersion, submitVersion } from '../services/reviews';
import { addComment, listComments } from '../services/version-comments';
import {
  changeVersion,
  createVersion,
  discardVersion,
  getVersion,
  reviseVersion,
  versionDifferences,
  versionHistory,
} from '../services/versions';
import { baseUrl, idParams, versionParams } from './parts';
import { type Route, workspaceRoute } from './route';

const tag = 'Parameter sets';
const version = { schema: versionSchema, name: 'ParameterSetVersion' };
const ONE = '/parameter-sets/:id/versions/:n';
const reviewFailures = {
  403: 'The role does not allow it, or it is the caller’s own work',
  409: 'It is not in review (any more)',
};

const drafts: Route[] = [
  workspaceRoute({
    method: 'post',
    path: '/parameter-sets/:id/versions',
    tag,
    summary: 'Save a further version, a draft',
    permission: 'set:draft',
    params: idParams,
    body: versionCreateSchema,
    success: { status: 201, description: 'The version', ...version },
    handle: async ({ ctx, actor, params, body }) =>
      presentVersion(await createVersion(ctx, actor, params.id, body)),
  }),
  workspaceRoute({
    method: 'get',
    path: ONE,
    tag,
    summary: 'One version',
    permission: 'workspace:read',
    params: versionParams,
    success: { status: 200, description: 'The version', ...version },
    handle: async ({ ctx, actor, params: { id, n } }) => presentVersion(await getVersion(ctx, actor, id, n)),
  }),
  workspaceRoute({
    method: 'patch',
    path: ONE,
    tag,
    summary: 'Change a draft; for its author',
    permission: 'set:draft',
    params: versionParams,
    body: versionPatchSchema,
    success: { status: 200, description: 'The version', ...version },
    failures: { 409: 'It has been submitted' },
    handle: async ({ ctx, actor, params: { id, n }, body }) =>
      presentVersion(await changeVersion(ctx, actor, id, n, body)),
  }),
  workspaceRoute({
    method: 'delete',
    path: ONE,
    tag,
    summary: 'Discard a draft; for its author or an admin. The last version takes its set with it',
    permission: 'set:draft',
    params: versionParams,
    success: { status: 204, description: 'Discarded' },
    failures: { 409: 'It has been submitted' },
    handle: ({ ctx, actor, params: { id, n } }) => discardVersion(ctx, actor, id, n),
  }),
  workspaceRoute({
    method: 'post',
    path: `${ONE}/revise`,
    tag,
    summary: 'Make a new draft that begins as a copy',
    permission: 'set:draft',
    params: versionParams,
    body: versionReviseSchema,
    success: { status: 201, description: 'The new version', ...version },
    handle: async ({ ctx, actor, params: { id, n }, body }) =>
      presentVersion(await reviseVersion(ctx, actor, id, n, body)),
  }),
];

const reviews: Route[] = [
  workspaceRoute({
    method: 'post',
    path: `${ONE}/submit`,
    tag,
    summary: 'Ask for a review; from then on the version is never changed',
    permission: 'set:draft',
    params: versionParams,
    success: { status: 200, description: 'The version, in review', ...version },
    failures: { 409: 'It is no draft, or its set has no vehicle' },
    handle: async ({ ctx, actor, params: { id, n }, req }) =>
      presentVersion(await submitVersion(ctx, actor, id, n, baseUrl(ctx.config, req))),
  }),
  workspaceRoute({
    method: 'post',
    path: `${ONE}/return`,
    tag,
    summary: 'Return it to its author with a comment',
    permission: 'set:review',
    params: versionParams,
    body: returnSchema,
    success: { status: 200, description: 'The version, returned', ...version },
    failures: reviewFailures,
    handle: async ({ ctx, actor, params: { id, n }, body, req }) =>
      presentVersion(await returnVersion(ctx, actor, id, n, body, baseUrl(ctx.config, req))),
  }),
  workspaceRoute({
    method: 'post',
    path: `${ONE}/release`,
    tag,
    summary: 'Release it for the vehicle of its set; what was released before is superseded',
    permission: 'set:review',
    params: versionParams,
    body: releaseSchema,
    success: { status: 200, description: 'The version, released', ...version },
    failures: reviewFailures,
    handle: async ({ ctx, actor, params: { id, n }, body, req }) =>
      presentVersion(await releaseVersion(ctx, actor, id, n, body, baseUrl(ctx.config, req))),
  }),
];

const said: Route[] = [
  workspaceRoute({
    method: 'get',
    path: `${ONE}/differences`,
    tag,
    summary: 'What differs from another version of the set, parameter by parameter',
    permission: 'workspace:read',
    params: versionParams,
    query: differencesQuerySchema,
    success: {
      status: 200,
      description: 'In the order of the bench',
      schema: differencesSchema,
      name: 'VersionDifferences',
    },
    handle: async ({ ctx, actor, params: { id, n }, query: { against } }) => ({
      against,
      number: n,
      parameters: await versionDifferences(ctx, actor, id, n, against),
    }),
  }),
  workspaceRoute({
    method: 'get',
    path: `${ONE}/history`,
    tag,
    summary: 'Who did what to the version, and when',
    permission: 'workspace:read',
    params: versionParams,
    success: {
      status: 200,
      description: 'Oldest first',
      schema: pageOf(auditEntrySchema),
      name: 'VersionHistory',
    },
    handle: async ({ ctx, actor, params: { id, n } }) =>
      presentWhole(await versionHistory(ctx, actor, id, n), presentHistoryEntry),
  }),
  workspaceRoute({
    method: 'get',
    path: `${ONE}/comments`,
    tag,
    summary: 'Comments on the version and on its parameters',
    permission: 'workspace:read',
    params: versionParams,
    success: {
      status: 200,
      description: 'Oldest first',
      schema: pageOf(versionCommentSchema),
      name: 'VersionCommentPage',
    },
    handle: async ({ ctx, actor, params: { id, n } }) =>
      presentWhole(await listComments(ctx, actor, id, n), presentComment),
  }),
  workspaceRoute({
    method: 'post',
    path: `${ONE}/comments`,
    tag,
    summary: 'Comment on the version, or on one of its parameters',
    permission: 'comment:write',
    params: versionParams,
    body: commentCreateSchema,
    success: {
      status: 201,
      description: 'The comment',
      schema: versionCommentSchema,
      name: 'VersionComment',
    },
    handle: async ({ ctx, actor, params: { id, n }, body }) =>
      presentComment(await addComment(ctx, actor, id, n, body)),
  }),
];

export const versionRoutes: Route[] = [...drafts, ...reviews, ...said];
