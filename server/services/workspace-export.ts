/** All data of a workspace as one archive: what was uploaded, as it was uploaded, and everything else as JSON. */
import { Op } from 'sequelize';
import { safeFileName } from '@/workers';
import type { Actor, Context } from '../context';
import { auditCsv } from '../exports/audit-csv';
import { tar, type TarEntry } from '../exports/tar';
import { presentMember } from '../presenters/accounts';
import { presentSetDetail } from '../presenters/parameter-set';
import { presentRecording } from '../presenters/recording';
import { presentRequirement } from '../presenters/requirement';
import { presentRun } from '../presenters/run';
import { presentVehicle } from '../presenters/vehicle';
import { presentMatrix } from '../presenters/verification';
import { presentComment } from '../presenters/version-review';
import { VERSION } from '../version';
import { allAudit, recordBy } from './audit';
import { listMembers } from './members';
import { newestFirst } from './paging';
import { getSet } from './parameter-sets';
import { listRequirements } from './requirements';
import { listVehicles } from './vehicles';
import { listComments } from './version-comments';
import { loadMatrix } from './verification-matrix';

const PAGE = 100;

export interface Archive {
  fileName: string;
  content: AsyncIterable<Uint8Array>;
}

/** Audited, then streamed: nothing of it is held in memory but one page of rows. */
export async function exportWorkspace(ctx: Context, actor: Actor): Promise<Archive> {
  await ctx.db.transaction((transaction) =>
    recordBy(ctx, actor, { action: 'workspace.exported', subject: actor.workspaceName }, transaction),
  );
  const now = ctx.clock();
  const name = safeFileName(`${actor.workspaceName}-${now.toISOString().slice(0, 10)}`);
  return { fileName: `${name}.tar`, content: tar(entries(ctx, actor, now), now) };
}

async function* entries(ctx: Context, actor: Actor, now: Date): AsyncGenerator<TarEntry> {
  const { workspaceId, workspaceName } = actor;
  const about = { id: workspaceId, name: workspaceName, exportedAt: now.toISOString(), version: VERSION };
  yield json('workspace.json', about);
  yield json('members.json', (await listMembers(ctx, actor)).map(presentMember));
  yield* pages('vehicles', (page) => listVehicles(ctx, actor, { ...page, sort: 'name' }), presentVehicle);
  yield* pages('requirements', (page) => listRequirements(ctx, actor, page), presentRequirement);
  yield* recordings(ctx, actor);
  const ofRuns = { include: ['createdBy', 'recording'] };
  yield* pages('runs', (page) => newestFirst(ctx.db.Run, page, { workspaceId }, ofRuns), presentRun);
  yield* sets(ctx, actor);
  yield await whole('audit.csv', auditCsv(allAudit(ctx, actor, {})));
}

/** Rows, then the files that were uploaded. What is not there any more, or not yet, is left out. */
async function* recordings(ctx: Context, { workspaceId }: Actor): AsyncGenerator<TarEntry> {
  const where = { workspaceId, confirmedAt: { [Op.ne]: null }, deletedAt: null };
  const include = ['vehicle', 'createdBy', { association: 'files', separate: true }];
  const find = (page: Page) => newestFirst(ctx.db.Recording, page, where, { include });
  yield* pages('recordings', find, presentRecording);
  for await (const { id, files = [] } of rows(find)) {
    for (const { role, name, storeKey } of files) {
      if (!(await ctx.store.has(storeKey))) continue;
      const path = `recordings/${id}/${role}-${safeFileName(name).slice(-60)}`;
      yield { path, bytes: await ctx.store.size(storeKey), content: await ctx.store.stream(storeKey) };
    }
  }
}

/** A file a set: its versions with what was said of them and how they were verified. */
async function* sets(ctx: Context, actor: Actor): AsyncGenerator<TarEntry> {
  const { workspaceId } = actor;
  for await (const { id } of rows((page) => newestFirst(ctx.db.ParameterSet, page, { workspaceId }))) {
    const whole = await getSet(ctx, actor, id);
    const versions = [];
    for (const version of whole.versions) {
      versions.push({
        number: version.number,
        comments: (await listComments(ctx, actor, id, version.number)).map(presentComment),
        verification: presentMatrix(await loadMatrix(ctx, whole.set, version)),
        evidence: version.evidence ?? null,
      });
    }
    yield json(`parameter-sets/${id}.json`, { ...presentSetDetail(whole), reviews: versions });
  }
}

interface Page {
  limit: number;
  cursor?: string | undefined;
}
type Find<R> = (page: Page) => Promise<{ items: R[]; nextCursor: string | null }>;

/** One file a page, so that no table has to fit into memory. */
async function* pages<R, T>(name: string, find: Find<R>, present: (row: R) => T): AsyncGenerator<TarEntry> {
  let cursor: string | undefined;
  let number = 0;
  do {
    const page = await find({ limit: PAGE, cursor });
    number += 1;
    yield json(`${name}/${String(number).padStart(5, '0')}.json`, page.items.map(present));
    cursor = page.nextCursor ?? undefined;
  } while (cursor);
}

async function* rows<R>(find: Find<R>): AsyncGenerator<R> {
  let cursor: string | undefined;
  do {
    const page = await find({ limit: PAGE, cursor });
    yield* page.items;
    cursor = page.nextCursor ?? undefined;
  } while (cursor);
}

function json(path: string, value: unknown): TarEntry {
  const content = Buffer.from(`${JSON.stringify(value, null, 1)}\n`, 'utf8');
  return { path, bytes: content.byteLength, content: [content] };
}

/** For text whose length is known only at its end. */
async function whole(path: string, lines: AsyncIterable<string>): Promise<TarEntry> {
  const parts: Buffer[] = [];
  for await (const line of lines) parts.push(Buffer.from(line, 'utf8'));
  const content = Buffer.concat(parts);
  return { path, bytes: content.byteLength, content: [content] };
}
