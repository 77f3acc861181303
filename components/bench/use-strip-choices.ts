/** What the bench's strip offers: what its runs have to withhold, and the times of the fixes to snap to. */
import { useMemo } from 'react';
import { useRecordingSeries } from '@/hooks/recordings';
import type { Parameters } from '@/shared/contracts/parameters';
import type { Recording } from '@/shared/contracts/recordings';
import type { Outage } from '@/shared/contracts/runs';
import type { Bench } from './use-bench';

/** More fixes than this come thinned: then none is snapped to. */
const FIX_POINTS = 10_000;

export function useStripChoices({ start, config }: Bench) {
  const { id, health } = start.recording;
  const series = useRecordingSeries(id, { channels: ['gnss_height'], points: FIX_POINTS }).data;
  const withholdable = useMemo(() => whatRunsHave(health, config.parameters), [health, config.parameters]);
  const times = series?.channels[0]?.timeS;
  return { withholdable, epochsS: times && times.length < FIX_POINTS / 2 ? times : undefined };
}

/** GNSS and its parts, then the aids that are switched on. */
export function whatRunsHave(
  health: Recording['health'],
  { aids }: Pick<Parameters, 'aids'>,
): Outage['withhold'][] {
  const parts: Outage['withhold'][] = health?.gnss.hasVelocity === false ? [] : ['position', 'velocity'];
  const inUse: [Outage['withhold'], boolean][] = [
    ['zero-velocity', aids.zeroVelocity.enabled],
    ['zero-rotation', aids.zeroRotation.enabled],
    ['non-holonomic', aids.nonHolonomic.enabled],
    ['barometer', aids.barometer.enabled],
    ['heading', aids.heading.enabled],
    ['odometer', aids.odometer.enabled],
    ['attitude', aids.attitude.enabled],
  ];
  return ['gnss', ...parts, ...inUse.filter(([, on]) => on).map(([name]) => name)];
}
