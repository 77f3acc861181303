/** Who gets which letter about a version. All are written in the transaction of the change that they tell of. */
import type { Transaction } from 'sequelize';
import { wantsLetter, type LetterKind } from '@/shared/contracts/preferences';
import { can } from '@/shared/contracts/roles';
import type { Actor, Context, JobContext } from '../context';
import type { Letter } from '../mail/letters';
import { queueLetter } from '../mail/outbox';
import {
  type FailingCell,
  type NamedVersion,
  releasedLetter,
  returnedLetter,
  reviewAskedLetter,
  verificationFailedLetter,
} from '../mail/version-letters';
import type { Membership, User } from '../models/accounts';
import type { ParameterSet, SetVersion } from '../models/parameter-set';
import { readPreferences } from './preferences';

/** What was done to which version, by whom, as seen from which address. */
export interface Done {
  actor: Actor;
  set: ParameterSet;
  version: SetVersion;
  baseUrl: string;
}

/** To everybody who may review the version: whoever wrote or submitted it may not. */
export async function tellReviewAsked(ctx: Context, done: Done, transaction: Transaction): Promise<void> {
  const named = await nameVersion(ctx, done, transaction);
  const { actor, version } = done;
  const reviewers = (await membersOf(ctx, actor.workspaceId, transaction)).filter(
    ({ role, userId }) => can(role, 'set:review') && !isOwn(version, userId),
  );
  const letters = wanting(reviewers, 'reviewAsked').map(({ email }) =>
    reviewAskedLetter(email, actor.name, named, version.note),
  );
  await send(ctx, done, letters, transaction);
}

/** To who wrote it and who submitted it. */
export async function tellReturned(
  ctx: Context,
  done: Done,
  comment: string,
  transaction: Transaction,
): Promise<void> {
  const named = await nameVersion(ctx, done, transaction);
  const { actor, version } = done;
  const owners = (await membersOf(ctx, actor.workspaceId, transaction)).filter(({ userId }) =>
    isOwn(version, userId),
  );
  const letters = wanting(owners, 'returned').map(({ email }) =>
    returnedLetter(email, actor.name, named, comment),
  );
  await send(ctx, done, letters, transaction);
}

/** To who wrote it and who submitted it, and to members who want to hear of every release. */
export async function tellReleased(
  ctx: Context,
  done: Done,
  { comment, superseded }: { comment: string; superseded: string | null },
  transaction: Transaction,
): Promise<void> {
  const named = await nameVersion(ctx, done, transaction);
  const { actor, version } = done;
  const others = (await membersOf(ctx, actor.workspaceId, transaction)).filter(
    ({ userId }) => userId !== actor.userId,
  );
  const owners = wanting(
    others.filter(({ userId }) => isOwn(version, userId)),
    'released',
  );
  const listeners = wanting(others, 'anyReleased').filter((user) => !owners.includes(user));
  const letters = [...owners, ...listeners].map(({ id, email }) =>
    releasedLetter(email, actor.name, named, { comment, superseded, own: isOwn(version, id) }),
  );
  await send(ctx, done, letters, transaction);
}

/** To one who started the verification, where still a member. */
export async function tellVerificationFailed(
  ctx: JobContext,
  { userId, set, version, baseUrl }: Omit<Done, 'actor'> & { userId: string },
  { cells, total }: { cells: FailingCell[]; total: number },
  transaction: Transaction,
): Promise<void> {
  const { workspaceId } = set;
  const members = await membersOf(ctx, workspaceId, transaction);
  const named = await nameVersion(ctx, { set, version, baseUrl }, transaction, 'verification');
  const starters = members.filter((member) => member.userId === userId);
  for (const { email, name } of wanting(starters, 'verificationFailed')) {
    const letter = verificationFailedLetter(email, name, named, cells, total);
    await queueLetter(ctx.db, letter, { workspaceId, now: ctx.clock() }, transaction);
  }
}

const isOwn = ({ createdById, submittedById }: SetVersion, userId: string) =>
  userId === createdById || userId === submittedById;

const membersOf = (ctx: JobContext, workspaceId: string, transaction: Transaction): Promise<Membership[]> =>
  ctx.db.Membership.findAll({ where: { workspaceId }, include: ['user'], transaction });

const wanting = (members: Membership[], kind: LetterKind): User[] =>
  members.flatMap(({ user }) => (user && wantsLetter(readPreferences(user.preferences), kind) ? [user] : []));

async function send(ctx: Context, { actor }: Done, letters: Letter[], transaction: Transaction) {
  for (const letter of letters) await ctx.mail.send(letter, transaction, actor.workspaceId);
}

/** `page`: of the version's pages, the one that the letter leads to. */
async function nameVersion(
  ctx: JobContext,
  { set, version: { number }, baseUrl }: Omit<Done, 'actor'>,
  transaction: Transaction,
  page: 'version' | 'verification' = 'version',
): Promise<NamedVersion> {
  const { id, name, workspaceId, vehicleId } = set;
  const vehicle = vehicleId ? await ctx.db.Vehicle.findByPk(vehicleId, { transaction }) : null;
  const workspace = await ctx.db.Workspace.findByPk(workspaceId, { transaction, rejectOnEmpty: true });
  const path = page === 'verification' ? `/sets/${id}/verification` : `/sets/${id}`;
  return {
    set: name,
    number,
    vehicle: vehicle?.name ?? null,
    workspace: workspace.name,
    url: `${baseUrl}${path}?version=${number}`,
  };
}
