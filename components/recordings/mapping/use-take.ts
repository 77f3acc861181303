import { useState } from 'react';
import type { ChannelMap, Recording } from '@/shared/contracts/recordings';
import { draftFromMap } from './draft-from-map';
import type { MapDraft } from './map-draft';
import { mapFromDraft } from './map-from-draft';
import type { TakeMap } from './PreviewFindings';

/** Puts parts of a map into the form, and takes the latest out again. */
export function useTake(
  previews: Recording['previews'],
  read: () => MapDraft,
  write: (draft: Partial<MapDraft>) => void,
) {
  const [latest, setLatest] = useState<{ label: string; before: MapDraft } | null>(null);
  const take: TakeMap = (parts, label) => {
    const before = structuredClone(read());
    const whole = draftFromMap({ channelMap: { ...mapFromDraft(before), ...parts }, previews });
    const changed = (Object.keys(parts) as (keyof ChannelMap)[]).filter((role) => whole[role] !== undefined);
    write(Object.fromEntries(changed.map((role) => [role, whole[role]])));
    setLatest({ label, before });
  };
  const settle = () => setLatest(null);
  const undo = () => {
    if (latest) write(latest.before);
    settle();
  };
  return { take, note: { taken: latest?.label ?? null, onUndo: undo, onClose: settle } };
}
