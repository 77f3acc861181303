/** What guessing a channel map answers. */
import type { ChannelGuess } from '@/shared/contracts/recordings';

export interface Guess<M> {
  /** Null where `missing` is not empty. */
  map: M | null;
  /** Channels that no column was found for, in plain words. */
  missing: string[];
  /** What was taken for granted, in whole sentences. */
  assumed: string[];
  /** Every channel that was found, with the reason. */
  guesses: ChannelGuess[];
}

export const guessed = (
  channel: string,
  columns: readonly string[],
  takenAs: string,
  confidence: number,
  reason: string,
): ChannelGuess => ({ channel, columns: [...columns], takenAs, confidence, reason });
