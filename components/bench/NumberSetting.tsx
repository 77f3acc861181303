import { useState } from 'react';
import { Field } from '@/components/ui/Field';
import { parseNumber } from '@/components/forms/parse-number';
import { readPath } from './parameter-path';
import type { Bench } from './use-bench';

export interface NumberSettingProps {
  bench: Bench;
  path: string;
  label: string;
  unit: string;
  range: readonly [number, number];
  /** May be empty; what then counts. */
  optional?: string;
  hint?: string;
}

/** A typed number of the parameters; taken when the field is left or Enter is pressed. A wrong one stays, with its reason. */
export function NumberSetting({ bench, path, label, unit, range, optional, hint }: NumberSettingProps) {
  const value = readPath(bench.config.parameters, path);
  const [typed, setTyped] = useState<string | null>(null);
  const [problem, setProblem] = useState<string | null>(null);
  const apply = () => {
    if (typed === null) return;
    const next = parseNumber(typed);
    if (next === undefined && optional === undefined) return setProblem(`Type a number in ${unit}.`);
    if (next !== undefined && !(next >= range[0] && next <= range[1]))
      return setProblem(`Between ${range[0]} and ${range[1]} ${unit}.`);
    setProblem(null);
    setTyped(null);
    if ((next ?? null) !== value) bench.setParameter(path, next ?? null, true);
  };
  return (
    <Field
      label={label}
      unit={unit}
      numeric
      value={typed ?? (value === null ? '' : String(value))}
      placeholder={optional}
      onChangeText={(text) => {
        setTyped(text);
        setProblem(null);
      }}
      onBlur={apply}
      onSubmitEditing={apply}
      error={problem ?? undefined}
      hint={hint}
      editable={bench.locked === null}
    />
  );
}
