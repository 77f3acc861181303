/** Requirements and versions to verify, for API tests. */
import type { ParameterSetDetail } from '@/shared/contracts/parameter-sets';
import type { Requirement } from '@/shared/contracts/requirements';
import { type Verification, verificationSchema } from '@/shared/contracts/verification';
import { type Caller, until } from './api';

let count = 0;

export const every = (everyS: number, forS: number) => ({ kind: 'every', everyS, forS, firstAfterS: 5 });

/** A limit on horizontal drift after 10 s unless overridden. */
export async function buildRequirement(
  caller: Caller,
  recordingIds: string[],
  overrides: object = {},
): Promise<Requirement> {
  const answer = await caller.post('/requirements', {
    name: `Requirement ${++count}`,
    metric: { kind: 'drift', quantity: 'horizontal', afterS: 10, statistic: 'maximum' },
    comparison: 'at-most',
    limit: 1e6,
    recordingIds,
    schedule: every(15, 10),
    ...overrides,
  });
  if (answer.status !== 201)
    throw new Error(`POST /requirements was answered ${answer.status}: ${answer.bytes}`);
  return answer.body as Requirement;
}

/** A set of one draft; answers the path of the draft. */
export async function buildDraft(
  caller: Caller,
  vehicleId: string | null,
  parameters: object = {},
): Promise<{ setId: string; path: string }> {
  const answer = await caller.post('/parameter-sets', {
    name: `Verified set ${++count}`,
    ...(vehicleId ? { vehicleId } : {}),
    version: { note: 'Datasheet figures.', parameters },
  });
  const { id: setId } = answer.body as ParameterSetDetail;
  return { setId, path: `/parameter-sets/${setId}/versions/1` };
}

export const verificationOf = async (caller: Caller, path: string): Promise<Verification> =>
  verificationSchema.parse((await caller.get(`${path}/verification`)).body);

/** Starts the verification and waits for its end. */
export async function verified(caller: Caller, path: string): Promise<Verification> {
  const answer = await caller.post(`${path}/verify`);
  if (answer.status !== 202) throw new Error(`verify was answered ${answer.status}: ${answer.bytes}`);
  return verificationEnds(caller, path);
}

export const verificationEnds = (caller: Caller, path: string): Promise<Verification> =>
  until(
    'the verification ends',
    async () => {
      const verification = await verificationOf(caller, path);
      return verification.state === 'done' && verification;
    },
    110_000,
  );
