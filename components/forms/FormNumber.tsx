import { useState } from 'react';
import { Controller, type Control, type FieldPath, type FieldValues } from 'react-hook-form';
import { Field, type FieldProps } from '@/components/ui/Field';
import { parseNumber } from './parse-number';

export interface FormNumberProps<T extends FieldValues> extends Omit<
  FieldProps,
  'value' | 'onChangeText' | 'error' | 'numeric'
> {
  control: Control<T>;
  name: FieldPath<T>;
  unit: string;
}

/** A number of a form, with its unit. What was typed stays on screen even while it is no number. */
export function FormNumber<T extends FieldValues>({ control, name, ...rest }: FormNumberProps<T>) {
  return (
    <Controller
      control={control}
      name={name}
      render={({ field, fieldState }) => (
        <NumberInput
          {...rest}
          ref={field.ref}
          number={field.value}
          onNumber={field.onChange}
          onBlur={field.onBlur}
          error={fieldState.error ? sentence(fieldState.error.message) : undefined}
        />
      )}
    />
  );
}

interface NumberInputProps extends Omit<FieldProps, 'value' | 'onChangeText' | 'numeric'> {
  number: number | undefined;
  /** NaN for text that is no number, undefined for an empty field. */
  onNumber: (value: number | undefined) => void;
}

function NumberInput({ number, onNumber, ...rest }: NumberInputProps) {
  const [text, setText] = useState(number === undefined || Number.isNaN(number) ? '' : String(number));
  const typed = parseNumber(text);
  // The form was reset from outside: show its number, not what was typed before.
  const shown = Object.is(typed, number) ? text : number === undefined ? '' : String(number);
  return (
    <Field
      {...rest}
      numeric
      value={shown}
      onChangeText={(next) => {
        setText(next);
        onNumber(parseNumber(next));
      }}
    />
  );
}

const sentence = (message: string | undefined) =>
  !message || /expected number|received/i.test(message) ? 'Write a number, for instance 0.35.' : message;
