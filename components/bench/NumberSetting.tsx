import { useState } from 'react';
import { Field } from '@/components/ui/Field';
import { useDisplayUnits } from '@/hooks/preferences';
import { fieldUnit, type ParameterField } from '@/shared/parameters/parameter-field';
import { readPath } from '@/shared/parameters/parameter-path';
import { leafAt } from './parameter-schema';
import { fieldText, readField } from './typed-field';
import type { Bench } from './use-bench';

export interface NumberSettingProps {
  bench: Bench;
  field: ParameterField;
}

/** A typed number of the parameters; taken when the field is left or Enter is pressed. A wrong one stays, with its reason. */
export function NumberSetting({ bench, field }: NumberSettingProps) {
  const { path, label, hint, unset, range } = field;
  const value = readPath(bench.config.parameters, path);
  const [typed, setTyped] = useState<string | null>(null);
  const [problem, setProblem] = useState<string | null>(null);
  const units = useDisplayUnits();
  const shown = fieldText(field, value, units);
  const apply = () => {
    if (typed === null) return;
    const result =
      typed === shown ? { value } : readField(field, { ...leafAt(path), ...range }, typed, units);
    if ('message' in result) return setProblem(result.message);
    setProblem(null);
    setTyped(null);
    if (result.value !== value) bench.setParameter(path, result.value, true);
  };
  return (
    <Field
      label={label}
      unit={fieldUnit(field, units)?.symbol}
      numeric
      value={typed ?? shown}
      placeholder={unset}
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
