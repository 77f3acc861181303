/** What waits for somebody: recordings under way or in need of a hand, versions in review or returned, runs that failed. Pure. */
import type { Href } from 'expo-router';
import { benchPath, mappingPath, recordingPath, versionPath } from '@/components/layout/paths';
import { statusWord } from '@/components/recordings/status';
import { VERSION_STATES } from '@/components/sets/version-words';
import type { ParameterSet } from '@/shared/contracts/parameter-sets';
import type { Recording } from '@/shared/contracts/recordings';
import { can, type Role } from '@/shared/contracts/roles';
import type { RunListItem } from '@/shared/contracts/runs';

export type WaitingTone = 'petrol' | 'ochre' | 'vermilion';

export interface Waiting {
  key: string;
  name: string;
  /** Its state, in a word or two. */
  word: string;
  tone: WaitingTone;
  sentence: string;
  /** Of decoding; null: nothing is under way. */
  progress: number | null;
  href: Href;
}

export interface WaitingInput {
  recordings: readonly Recording[];
  sets: readonly ParameterSet[];
  /** Failed ones, newest first. */
  runs: readonly RunListItem[];
  person: { name: string; role: Role };
  now: Date;
}

/** Under way first, then what needs a hand, what failed, and what others are waited for. Readers see what is under way only. */
export function waitingFor({ recordings, sets, runs, person, now }: WaitingInput): Waiting[] {
  const { role } = person;
  const items = [
    ...recordings.flatMap((recording) => recordingItem(recording) ?? []),
    ...sets.flatMap((set) => setItems(set, person)),
    ...failedRuns(runs, now),
  ];
  return items
    .filter(({ progress }) => progress !== null || can(role, 'set:draft'))
    .sort((a, b) => rank(a) - rank(b));
}

const ORDER: readonly WaitingTone[] = ['ochre', 'vermilion', 'petrol'];
const rank = ({ progress, tone }: Waiting) => (progress === null ? ORDER.indexOf(tone) : -1);

function recordingItem(recording: Recording): Waiting | null {
  const { id, name, status } = recording;
  const { word } = statusWord(recording);
  const base = { key: id, name, word, progress: null, href: recordingPath(id) };
  switch (status) {
    case 'uploaded':
      return { ...base, sentence: 'Waiting for a free worker', tone: 'petrol', progress: 0 };
    case 'decoding':
      return { ...base, sentence: 'Decoding', tone: 'petrol', progress: recording.progress };
    case 'needs-mapping':
      return { ...base, sentence: 'Say what its columns mean', tone: 'ochre', href: mappingPath(id) };
    case 'rejected':
      return { ...base, sentence: recording.problems[0]?.message ?? 'Could not be used', tone: 'vermilion' };
    case 'ready':
      return null;
  }
}

function setItems({ id, name, latest, inReviewNumbers }: ParameterSet, person: WaitingInput['person']) {
  const inReview = inReviewNumbers.map((number): Waiting => {
    const own = number === latest.number && latest.createdBy === person.name;
    const reviews = can(person.role, 'set:review') && !own;
    return {
      key: `${id} ${number}`,
      name: `${name}, version ${number}`,
      word: VERSION_STATES['in-review'].word,
      tone: reviews ? 'ochre' : 'petrol',
      sentence: reviews ? 'Waits for your review' : 'Waits for an approver who did not write it',
      progress: null,
      href: versionPath(id, number),
    };
  });
  if (latest.state !== 'returned') return inReview;
  const returned: Waiting = {
    key: `${id} ${latest.number}`,
    name: `${name}, version ${latest.number}`,
    word: VERSION_STATES.returned.word,
    tone: 'ochre',
    sentence: `Returned to ${latest.createdBy}: read why, and go on from a copy`,
    progress: null,
    href: versionPath(id, latest.number),
  };
  return [...inReview, returned];
}

const RECENT_MS = 2 * 86_400_000;
const MOST_RUNS = 3;

/** A recording's latest failure, while it is news. */
function failedRuns(runs: readonly RunListItem[], now: Date): Waiting[] {
  const recent = runs.filter(({ createdAt }) => now.getTime() - Date.parse(createdAt) < RECENT_MS);
  const newest = recent.filter(
    (run, i) => recent.findIndex(({ recordingId }) => recordingId === run.recordingId) === i,
  );
  return newest.slice(0, MOST_RUNS).map(({ id, recordingId, recordingName, failure }) => ({
    key: id,
    name: recordingName,
    word: 'run failed',
    tone: 'vermilion',
    sentence: failure ?? 'The run ended without a result',
    progress: null,
    href: benchPath(recordingId),
  }));
}
