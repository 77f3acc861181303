/** The words of letters about a version: review asked, returned, released, verification failed. */
import { compose, type Letter } from './letters';

/** The version that a letter is about, in the names that people know it by. */
export interface NamedVersion {
  set: string;
  number: number;
  /** Null: the set is for no vehicle yet. */
  vehicle: string | null;
  workspace: string;
  /** Address of its page. */
  url: string;
}

/** A cell of the matrix that neither passes nor is waived. */
export interface FailingCell {
  requirement: string;
  recording: string;
  /** Its run failed: nothing could be judged. */
  runFailed: boolean;
  reason: string | null;
}

/** Cells that a letter names; the page shows them all. */
const MOST_CELLS = 10;

export const reviewAskedLetter = (to: string, by: string, version: NamedVersion, note: string): Letter =>
  compose({
    to,
    subject: subjectOf('Review asked', version),
    lines: [`${by} asks for a review of ${phrase(version)}.`, ...quoted('The note of the version', note)],
    link: { label: 'Open the version', url: version.url },
    closing: closing('you may review versions in this workspace'),
  });

export const returnedLetter = (to: string, by: string, version: NamedVersion, comment: string): Letter =>
  compose({
    to,
    subject: subjectOf('Returned', version),
    lines: [
      `${by} returned ${phrase(version)}.`,
      ...quoted('The comment', comment),
      'The version stays as it is. To mend it, make a new draft from it.',
    ],
    link: { label: 'Open the version', url: version.url },
    closing: closing('you wrote or submitted the version'),
  });

/** `own`: the recipient wrote or submitted it. `superseded`: what was released for the vehicle before, in words. */
export const releasedLetter = (
  to: string,
  by: string,
  version: NamedVersion,
  { comment, superseded, own }: { comment: string; superseded: string | null; own: boolean },
): Letter =>
  compose({
    to,
    subject: subjectOf('Released', version),
    lines: [
      `${by} released ${phrase(version)}.`,
      ...(superseded ? [`It takes the place of ${superseded}.`] : []),
      ...quoted('The comment', comment),
    ],
    link: { label: 'Open the version', url: version.url },
    closing: closing(
      own ? 'you wrote or submitted the version' : 'you asked for one at every release in this workspace',
    ),
  });

/** `cells`: those that fail, of `total`. */
export const verificationFailedLetter = (
  to: string,
  name: string,
  version: NamedVersion,
  cells: readonly FailingCell[],
  total: number,
): Letter => {
  const named = cells.slice(0, MOST_CELLS).map(cellLine);
  const rest = cells.length - named.length;
  return compose({
    to,
    subject: subjectOf('Verification failed', version),
    lines: [
      `${name}, the verification that you started of ${phrase(version)} has ended: ${cells.length} of ${total} ${total === 1 ? 'cell' : 'cells'} failed.`,
      [...named, ...(rest > 0 ? [`and ${rest} more`] : [])].join('\n'),
    ],
    link: { label: 'Open the verification', url: version.url },
    closing: closing('you started the verification'),
  });
};

const subjectOf = (what: string, { set, number }: NamedVersion) => `${what}: “${set}”, version ${number}`;

const phrase = ({ set, number, vehicle, workspace }: NamedVersion) =>
  `version ${number} of “${set}” ${vehicle ? `for the vehicle “${vehicle}”` : 'for no vehicle yet'}, in the workspace “${workspace}”`;

const quoted = (what: string, words: string) => (words.trim() ? [`${what}:\n${words.trim()}`] : []);

const cellLine = ({ requirement, recording, runFailed, reason }: FailingCell) => {
  const verdict = runFailed ? 'its run failed' : 'fails';
  return `– “${requirement}” on “${recording}”: ${verdict}${reason ? ` (${reason.replace(/\.$/, '')})` : ''}`;
};

const closing = (why: string) =>
  `You get this letter because ${why}. Which letters you get is chosen under Profile in Driftwright.`;
