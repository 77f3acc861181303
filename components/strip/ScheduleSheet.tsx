import { useState } from 'react';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Dialog } from '@/components/ui/Dialog';
import { Field } from '@/components/ui/Field';
import { Sheet } from '@/components/ui/Sheet';
import { Text } from '@/components/ui/Text';
import type { Outage } from '@/shared/contracts/runs';
import { isProblem, planSchedule, planWords, type ScheduleField } from './schedule';
import { withholdOptions } from './window-kinds';
import { parseClock, type WindowLimits } from './window-model';

export interface ScheduleSheetProps {
  windows: readonly Outage[];
  limits: WindowLimits;
  withholdable: readonly Outage['withhold'][];
  onApply: (windows: Outage[]) => void;
  onClose: () => void;
}

type Typed = Record<ScheduleField, string>;

/** Outages every N s for T s; says what it makes before it is applied. */
export function ScheduleSheet({ windows, limits, withholdable, onApply, onClose }: ScheduleSheetProps) {
  const { wide } = useBreakpoint();
  const [typed, setTyped] = useState<Typed>(() => firstSchedule(limits));
  const [withhold, setWithhold] = useState<Outage['withhold']>('gnss');
  const [mode, setMode] = useState<'replace' | 'add'>(windows.length > 0 ? 'add' : 'replace');
  const plan = planSchedule(
    {
      everyS: parseClock(typed.everyS),
      lengthS: parseClock(typed.lengthS),
      fromS: parseClock(typed.fromS),
      toS: parseClock(typed.toS),
      withhold,
      adds: mode === 'add',
    },
    windows,
    limits,
  );
  const problem = isProblem(plan) ? plan : null;
  const apply = () => {
    if (!isProblem(plan) && plan.made > 0) onApply(plan.windows);
  };
  const Frame = wide ? Dialog : Sheet;
  return (
    <Frame
      open
      title="Schedule outage windows"
      onClose={onClose}
      footer={
        <Button
          label={isProblem(plan) ? 'Draw the windows' : `Draw ${plan.made} windows`}
          kind="primary"
          disabled={isProblem(plan) || plan.made === 0}
          reason={problem?.message ?? 'All of them are in the way of windows that stay.'}
          onPress={apply}
        />
      }
    >
      {FIELDS.map(({ field, label, unit }) => (
        <Field
          key={field}
          label={label}
          unit={unit}
          numeric
          value={typed[field]}
          onChangeText={(text) => setTyped((old) => ({ ...old, [field]: text }))}
          onSubmitEditing={apply}
          error={problem?.field === field ? problem.message : undefined}
        />
      ))}
      <Choice
        label="Withheld from the filter"
        shape="select"
        value={withhold}
        onChange={setWithhold}
        options={withholdOptions(withholdable, withhold)}
      />
      {windows.length > 0 ? (
        <Choice
          label={`The ${windows.length === 1 ? 'window' : `${windows.length} windows`} that are there`}
          shape="segments"
          value={mode}
          onChange={setMode}
          options={[
            { value: 'add', label: 'Stay' },
            { value: 'replace', label: 'Are replaced' },
          ]}
        />
      ) : null}
      <Text variant="label" tone="soft" role="status">
        {isProblem(plan) ? 'Nothing is drawn yet.' : planWords(plan)}
      </Text>
    </Frame>
  );
}

const FIELDS = [
  { field: 'everyS', label: 'Every', unit: 's' },
  { field: 'lengthS', label: 'For', unit: 's' },
  { field: 'fromS', label: 'From', unit: 's or min:s' },
  { field: 'toS', label: 'To', unit: 's or min:s' },
] as const;

/** A minute every five, or what a short recording holds; the first fifth is left to alignment. */
function firstSchedule({ startS, endS }: WindowLimits): Typed {
  const room = endS - startS;
  const length = Math.max(1, Math.min(60, Math.floor(room / 10)));
  return {
    everyS: String(length * 5),
    lengthS: String(length),
    fromS: String(Math.ceil(startS + room / 5)),
    toS: String(Math.floor(endS)),
  };
}
