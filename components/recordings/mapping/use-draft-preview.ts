import { useMemo } from 'react';
import { useWatch, type Control } from 'react-hook-form';
import { useMapPreview } from '@/hooks/recordings';
import { mapDraftSchema, type MapDraft } from './map-draft';
import { mapFromDraft } from './map-from-draft';

/** The preview of what the form says now; while something is missing in it, of what it said before. */
export function useDraftPreview(recordingId: string, control: Control<MapDraft>) {
  const draft = useWatch({ control });
  const map = useMemo(() => {
    const whole = mapDraftSchema.safeParse(draft);
    return whole.success ? mapFromDraft(whole.data) : null;
  }, [draft]);
  return { state: useMapPreview(recordingId, map), incomplete: map === null };
}
