/** What waits for somebody, out of the recordings. */
import type { Recording } from '@/shared/contracts/recordings';

export interface Waiting {
  recording: Recording;
  sentence: string;
  tone: 'petrol' | 'ochre' | 'vermilion';
  progress: number | null;
  /** Leads to the mapping form instead of the recording. */
  toMapping: boolean;
}

/** Under way first, then what needs a hand. Readers see what is under way only: they cannot map. */
export function waitingFor(recordings: readonly Recording[], mayWrite: boolean): Waiting[] {
  const waiting = recordings.flatMap((recording) => itemOf(recording) ?? []);
  return waiting
    .filter((item) => mayWrite || item.progress !== null)
    .sort((a, b) => ORDER.indexOf(a.tone) - ORDER.indexOf(b.tone));
}

const ORDER: readonly Waiting['tone'][] = ['petrol', 'ochre', 'vermilion'];

function itemOf(recording: Recording): Waiting | null {
  const base = { recording, toMapping: false, progress: null };
  switch (recording.status) {
    case 'uploaded':
      return { ...base, sentence: 'Waiting for a free worker', tone: 'petrol', progress: 0 };
    case 'decoding':
      return { ...base, sentence: 'Decoding', tone: 'petrol', progress: recording.progress };
    case 'needs-mapping':
      return { ...base, sentence: 'Say what its columns mean', tone: 'ochre', toMapping: true };
    case 'rejected':
      return { ...base, sentence: recording.problems[0]?.message ?? 'Could not be used', tone: 'vermilion' };
    case 'ready':
      return null;
  }
}
