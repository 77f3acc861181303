/** What the signed-in person chose for themselves: display units, hints seen. It arrives with the session. */
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useContext } from 'react';
import type { Me } from '@/shared/contracts/accounts';
import type { Hint, Preferences, PreferencesPatch } from '@/shared/contracts/preferences';
import type { DisplayUnits } from '@/shared/display-units';
import { api } from './api';
import { SessionContext, sessionKeys } from './session';

const NONE: Preferences = { units: {}, letters: {}, hintsSeen: [] };

export const usePreferences = (): Preferences => useContext(SessionContext)?.preferences ?? NONE;

/** The units that the person chose; every value on screen goes through them by shared/display-units.ts. */
export const useDisplayUnits = (): DisplayUnits => usePreferences().units;

/** Shown at once, taken back where the server refuses. */
export function usePatchPreferences() {
  const client = useQueryClient();
  const show = (preferences: Preferences) =>
    client.setQueryData<Me | null>(sessionKeys.me, (me) => (me ? { ...me, preferences } : me));
  return useMutation({
    mutationFn: (patch: PreferencesPatch) =>
      api<Preferences>('/me/preferences', { method: 'PATCH', body: patch }),
    onMutate: (patch) => {
      const before = client.getQueryData<Me | null>(sessionKeys.me)?.preferences ?? NONE;
      show({ ...before, ...patch });
      return { before };
    },
    onSuccess: show,
    onError: (_, __, context) => context && show(context.before),
  });
}

/** A hint that is shown until its person has read it; `seen` puts it away for good. */
export function useHint(hint: Hint): { open: boolean; seen: () => void } {
  const { hintsSeen } = usePreferences();
  const { mutate } = usePatchPreferences();
  return {
    open: !hintsSeen.includes(hint),
    seen: () => mutate({ hintsSeen: [...hintsSeen, hint] }),
  };
}
