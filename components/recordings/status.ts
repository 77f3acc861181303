import type { Tone } from '@/components/ui/Text';
import type { HealthReport, Recording } from '@/shared/contracts/recordings';

/** What a recording is good for, in a word or two, and the word's colour. */
export function statusWord(recording: Pick<Recording, 'status' | 'progress' | 'health'>): {
  word: string;
  tone: Tone;
} {
  switch (recording.status) {
    case 'uploaded':
      return { word: 'waiting', tone: 'petrol' };
    case 'decoding':
      return { word: `decoding ${Math.round(recording.progress * 100)} %`, tone: 'petrol' };
    case 'needs-mapping':
      return { word: 'needs mapping', tone: 'ochre' };
    case 'rejected':
      return { word: 'rejected', tone: 'vermilion' };
    case 'ready':
      return recording.health ? VERDICTS[recording.health.verdict] : { word: 'ready', tone: 'ink' };
  }
}

export const VERDICTS: Record<
  HealthReport['verdict'],
  { word: string; tone: 'pine' | 'ochre' | 'vermilion' }
> = {
  usable: { word: 'usable', tone: 'pine' },
  'with-care': { word: 'with care', tone: 'ochre' },
  'not-usable': { word: 'not usable', tone: 'vermilion' },
};

export const FILE_ROLE: Record<Recording['files'][number]['role'], string> = {
  imu: 'IMU',
  gnss: 'GNSS',
  reference: 'Reference',
  imu2: 'Second IMU',
  aids: 'Other sensors',
};
