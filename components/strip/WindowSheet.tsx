import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Dialog } from '@/components/ui/Dialog';
import { Field } from '@/components/ui/Field';
import { Sheet } from '@/components/ui/Sheet';
import { Toggle } from '@/components/ui/Toggle';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import type { Outage } from '@/shared/contracts/runs';
import { withholdOptions } from './window-kinds';
import { parseClock, windowProblem, type WindowLimits } from './window-model';

export interface WindowSheetProps {
  /** Of which window; −1 a new one. */
  index: number;
  initial: Outage;
  windows: readonly Outage[];
  limits: WindowLimits;
  /** What a run here has to withhold. */
  withholdable: readonly Outage['withhold'][];
  /** Whether drags are snapped. */
  snaps: boolean;
  onSnaps: (snaps: boolean) => void;
  onApply: (window: Outage) => void;
  onRemove: () => void;
  onClose: () => void;
}

/** Typed start, length and what is withheld, of one outage window. What is wrong is said beside its field. */
export function WindowSheet({
  index,
  initial,
  windows,
  limits,
  withholdable,
  snaps,
  onSnaps,
  onApply,
  onRemove,
  onClose,
}: WindowSheetProps) {
  const { wide } = useBreakpoint();
  const [start, setStart] = useState(String(initial.startS));
  const [length, setLength] = useState(String(Math.round((initial.endS - initial.startS) * 1000) / 1000));
  const [withhold, setWithhold] = useState(initial.withhold);
  const [problem, setProblem] = useState<ReturnType<typeof windowProblem>>(null);
  const apply = () => {
    const [startS, lengthS] = [parseClock(start), parseClock(length)];
    const found = windowProblem(windows, limits, index, startS, lengthS);
    setProblem(found);
    if (!found) onApply({ startS, endS: startS + lengthS, withhold });
  };
  const Frame = wide ? Dialog : Sheet;
  return (
    <Frame
      open
      title={index < 0 ? 'New outage window' : `Outage window ${index + 1}`}
      onClose={onClose}
      footer={
        <>
          {index < 0 ? null : <Button label="Remove" kind="danger" icon="delete" onPress={onRemove} />}
          <Button label="Apply" kind="primary" onPress={apply} />
        </>
      }
    >
      <Field
        label="Start"
        unit="s or min:s"
        numeric
        value={start}
        onChangeText={setStart}
        onSubmitEditing={apply}
        error={problem?.field === 'start' ? problem.message : undefined}
      />
      <Field
        label="Length"
        unit="s"
        numeric
        value={length}
        onChangeText={setLength}
        onSubmitEditing={apply}
        error={problem?.field === 'length' ? problem.message : undefined}
      />
      <Choice
        label="Withheld from the filter"
        shape="select"
        value={withhold}
        onChange={setWithhold}
        options={withholdOptions(withholdable, withhold)}
      />
      <Toggle
        label="Snap while dragging"
        hint="To whole seconds, GNSS fixes and the edges of other windows. Alt held down does without."
        value={snaps}
        onChange={onSnaps}
      />
    </Frame>
  );
}
