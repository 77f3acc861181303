import { Controller, type Control, type FieldPath, type FieldValues } from 'react-hook-form';
import { Choice, type ChoiceProps } from '@/components/ui/Choice';

export interface FormChoiceProps<T extends FieldValues, V extends string> extends Omit<
  ChoiceProps<V>,
  'value' | 'onChange' | 'error'
> {
  control: Control<T>;
  name: FieldPath<T>;
}

/** A choice of a form. */
export function FormChoice<T extends FieldValues, V extends string>({
  control,
  name,
  ...rest
}: FormChoiceProps<T, V>) {
  return (
    <Controller
      control={control}
      name={name}
      render={({ field, fieldState }) => (
        <Choice {...rest} value={field.value} onChange={field.onChange} error={fieldState.error?.message} />
      )}
    />
  );
}
