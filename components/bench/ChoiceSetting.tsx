import { Choice, type ChoiceOption } from '@/components/ui/Choice';
import { readPath } from '@/shared/parameters/parameter-path';
import type { Bench } from './use-bench';

export interface ChoiceSettingProps {
  bench: Bench;
  path: string;
  label: string;
  options: readonly ChoiceOption<string>[];
}

/** One of several values of a parameter; a value that is none of them stays and is shown. */
export function ChoiceSetting({ bench, path, label, options }: ChoiceSettingProps) {
  const value = readPath(bench.config.parameters, path);
  const text = String(value);
  const known = options.some((option) => option.value === text);
  return (
    <Choice
      label={label}
      shape="select"
      value={text}
      options={known ? options : [...options, { value: text, label: text }]}
      onChange={(next) =>
        bench.setParameter(
          path,
          typeof value === 'number' ? Number(next) : typeof value === 'boolean' ? next === 'true' : next,
          true,
        )
      }
      disabled={bench.locked !== null}
    />
  );
}
