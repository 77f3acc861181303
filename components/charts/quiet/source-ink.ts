/** Inks of an error budget's sources: a colour and a pattern each, so that colour is never alone. */
import type { Palette } from '@/constants/theme';

export interface SourceInk {
  tone: keyof Palette;
  /** Hatched over its tint; otherwise filled. */
  hatched: boolean;
}

/** By rank: neighbours in the stack differ in colour and in pattern. */
export const sourceInk = (rank: number): SourceInk => INKS[rank % INKS.length]!;

const INKS: readonly SourceInk[] = [
  { tone: 'north', hatched: false },
  { tone: 'east', hatched: true },
  { tone: 'petrol', hatched: false },
  { tone: 'down', hatched: true },
  { tone: 'pine', hatched: false },
  { tone: 'ochre', hatched: true },
  { tone: 'profile', hatched: false },
  { tone: 'ghost', hatched: true },
];
