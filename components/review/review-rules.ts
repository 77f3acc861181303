/** What a person may do with a version as it stands; the server has the last word. Pure. */
import type { ParameterSetDetail, ParameterSetVersion } from '@/shared/contracts/parameter-sets';
import { can, type Role } from '@/shared/contracts/roles';

export interface ReviewSteps {
  /** Draft: the author asks for a review. */
  submit: boolean;
  editNote: boolean;
  discard: boolean;
  /** In review: an approver who did not write it. */
  review: boolean;
  /** Beyond a draft: anybody who drafts goes on from a copy. */
  revise: boolean;
  /** What is waited for, or why a step is not offered; null: nothing to say. */
  waiting: string | null;
}

export function reviewSteps(
  set: Pick<ParameterSetDetail, 'vehicleId'>,
  version: Pick<ParameterSetVersion, 'state' | 'createdById' | 'submittedBy'>,
  person: { id: string; role: Role; name: string },
): ReviewSteps {
  const { state } = version;
  const drafts = can(person.role, 'set:draft');
  const wrote = version.createdById === person.id;
  const reviews = can(person.role, 'set:review') && !wrote && version.submittedBy !== person.name;
  const draft = state === 'draft';
  return {
    submit: draft && drafts && set.vehicleId !== null,
    editNote: draft && wrote,
    discard: draft && (wrote || person.role === 'admin'),
    review: state === 'in-review' && reviews,
    revise: !draft && state !== 'in-review' && drafts,
    waiting: waitingFor(set, version, { drafts, wrote, reviews, person }),
  };
}

function waitingFor(
  set: Pick<ParameterSetDetail, 'vehicleId'>,
  { state }: Pick<ParameterSetVersion, 'state'>,
  {
    drafts,
    wrote,
    reviews,
    person,
  }: { drafts: boolean; wrote: boolean; reviews: boolean; person: { role: Role } },
): string | null {
  if (state === 'draft') {
    if (!drafts) return 'A draft: an engineer submits it for review.';
    return set.vehicleId === null
      ? 'A set is released for a vehicle: choose the vehicle before you submit it.'
      : null;
  }
  if (state !== 'in-review' || reviews) return null;
  if (can(person.role, 'set:review'))
    return wrote
      ? 'You wrote it: another approver reviews it.'
      : 'You submitted it: another approver reviews it.';
  return 'It waits for an approver. Until then nobody changes it.';
}
