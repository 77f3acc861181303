import { Button } from '@/components/ui/Button';
import { Notice } from '@/components/ui/Notice';
import { useHint } from '@/hooks/preferences';
import type { Hint } from '@/shared/contracts/preferences';

/** What helps on the first visit to a screen; one short thing each. */
const WORDS: Record<Hint, string> = {
  recordings:
    'The strip under a name is the whole drive: speed as a profile, GNSS fixes as ticks, what is missing or clipped marked. Open one to read what the intake found.',
  bench:
    'Drag across the strip at the top to withhold GNSS for a while; every change runs the filter again, and the figures say what it did against the baseline.',
  noise:
    'Choose a stretch in which nothing moves: the longer it is, the slower the noise that it can tell. A term that it cannot tell has no number.',
  sets: 'A set holds the parameters of a vehicle in numbered versions: saved from the bench with a note, reviewed, then released. What is released is never changed.',
};

/** A hint in the flow of the page, which covers nothing; “Got it” puts it away for this person on every device. */
export function FirstHint({ hint }: { hint: Hint }) {
  const { open, seen } = useHint(hint);
  if (!open) return null;
  return (
    <Notice tone="petrol" actions={<Button label="Got it" icon="check" onPress={seen} />}>
      {WORDS[hint]}
    </Notice>
  );
}
