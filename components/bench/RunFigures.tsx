import { useDisplayUnits } from '@/hooks/preferences';
import { FigureRows } from './FigureRows';
import { aidRows, stateRows, truthRows } from './figure-rows';
import { useSummary, type Bench } from './use-bench';

/** What the last run found besides the headline: nothing is shown of what was not asked for. */
export function RunFigures({ bench }: { bench: Bench }) {
  const summary = useSummary(bench);
  const units = useDisplayUnits();
  return (
    <>
      <FigureRows title="Aids" rows={aidRows(summary)} />
      <FigureRows title="Further states" rows={stateRows(summary)} />
      <FigureRows title="Error against truth" rows={truthRows(summary, units)} />
    </>
  );
}
