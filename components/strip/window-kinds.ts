/** What a window on the strip stands for, in words and in colour. */
import { formatClock } from '@/shared/format';
import type { Outage } from '@/shared/contracts/runs';
import { lengthLabel } from './labels';
import type { WindowLimits } from './window-model';

/** Vermilion is coasting and hatched; petrol is a choice. */
export type WindowTone = 'vermilion' | 'petrol';

export interface WindowKind<W extends WindowLimits> {
  tone: WindowTone;
  name: (index: number) => string;
  /** Ends the sentence that the screen reader says of a window: what it is, and which keys do what. */
  more: (window: W) => string;
}

/** A stretch in which something is withheld from the filter. */
export const OUTAGE_WINDOW: WindowKind<Outage> = {
  tone: 'vermilion',
  name: (index) => `Outage window ${index + 1}`,
  more: ({ withhold }) =>
    `${WITHHELD[withhold]} withheld. Arrow keys move it, Enter opens its times, Delete removes it.`,
};

/** The stretch that is analysed. */
export const CHOSEN_STRETCH: WindowKind<WindowLimits> = {
  tone: 'petrol',
  name: () => 'Chosen stretch',
  more: () => 'Arrow keys move it.',
};

/** A window's times and length in words. */
export const windowTimes = ({ startS, endS }: WindowLimits): string =>
  `${formatClock(startS)} to ${formatClock(endS)}, ${lengthLabel(endS - startS)}`;

/** A choice of what to withhold: what the run has, and whatever `chosen` is. */
export function withholdOptions(having: readonly Outage['withhold'][], chosen: Outage['withhold']) {
  const values = having.includes(chosen) ? having : [...having, chosen];
  return values.map((value) => ({
    value,
    label: WITHHELD[value][0]!.toUpperCase() + WITHHELD[value].slice(1),
  }));
}

export const WITHHELD: Record<Outage['withhold'], string> = {
  gnss: 'all GNSS',
  position: 'position',
  velocity: 'velocity',
  'zero-velocity': 'zero-velocity updates',
  'zero-rotation': 'zero-rotation updates',
  'non-holonomic': 'the non-holonomic constraint',
  barometer: 'the barometer',
  heading: 'the heading aid',
  odometer: 'the odometer',
  attitude: 'the attitude aid',
};
