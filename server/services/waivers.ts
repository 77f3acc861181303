/** An approver's written word that a cell of the matrix may stay as it is. Given once, for the cell as it stands, and kept. */
import type { WaiverCreate } from '@/shared/contracts/verification';
import type { Actor, Context } from '../context';
import { conflict, invalid } from '../errors';
import { recordBy } from './audit';
import { refuseOwn } from './reviews';
import { getVerification, type Verification } from './verification';
import { loadMatrix } from './verification-matrix';
import { lockVersion } from './versions';

/** Throws 409 unless the version is in review and the cell needs a waiver, 403 for who wrote or submitted the version. */
export async function addWaiver(
  ctx: Context,
  actor: Actor,
  setId: string,
  number: number,
  { requirementId, recordingId, text }: WaiverCreate,
): Promise<Verification> {
  await ctx.db.transaction(async (transaction) => {
    const { set, version } = await lockVersion(ctx, actor, setId, number, transaction);
    if (version.state !== 'in-review') throw conflict('A cell is waived while its version is in review.');
    refuseOwn(actor, version.createdById, version.submittedById ?? null);
    const { cells } = await loadMatrix(ctx, set, version, transaction);
    const cell = cells.find(
      (one) => one.requirement.id === requirementId && one.recording.id === recordingId,
    );
    if (!cell) {
      const message = 'The matrix has no cell of this requirement and this recording.';
      throw invalid(message, { errors: [{ path: 'requirementId', message }] });
    }
    const { requirement, recording, requirementHash, inputHash, settled, judged } = cell;
    if (settled) throw conflict('This cell needs no waiver: it passes, or has one already.');
    await ctx.db.Waiver.create(
      {
        versionId: version.id,
        requirementId,
        recordingId,
        requirementHash,
        inputHash,
        text,
        createdById: actor.userId,
      },
      { transaction },
    );
    const detail = {
      number,
      requirement: requirement.name,
      recording: recording.name,
      verdict: judged?.verdict ?? null,
      value: judged?.value ?? null,
      text,
    };
    const what = { action: 'version.cell-waived', subject: set.name, subjectId: version.id, detail };
    await recordBy(ctx, actor, what, transaction);
  });
  return getVerification(ctx, actor, setId, number);
}
