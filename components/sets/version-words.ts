import type { Tone } from '@/components/ui/Text';
import type { VersionState } from '@/shared/contracts/parameter-sets';

export const VERSION_STATES: Record<VersionState, { word: string; tone: Tone }> = {
  draft: { word: 'draft', tone: 'soft' },
  'in-review': { word: 'in review', tone: 'ochre' },
  returned: { word: 'returned', tone: 'vermilion' },
  released: { word: 'released', tone: 'pine' },
  superseded: { word: 'superseded', tone: 'soft' },
};
