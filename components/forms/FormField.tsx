import { Controller, type Control, type FieldPath, type FieldValues } from 'react-hook-form';
import { Field, type FieldProps } from '@/components/ui/Field';

export interface FormFieldProps<T extends FieldValues> extends Omit<
  FieldProps,
  'value' | 'onChangeText' | 'error'
> {
  control: Control<T>;
  name: FieldPath<T>;
}

/** A text field of a form. */
export function FormField<T extends FieldValues>({ control, name, ...rest }: FormFieldProps<T>) {
  return (
    <Controller
      control={control}
      name={name}
      render={({ field, fieldState }) => (
        <Field
          {...rest}
          ref={field.ref}
          value={String(field.value ?? '')}
          onChangeText={field.onChange}
          onBlur={field.onBlur}
          error={fieldState.error?.message}
        />
      )}
    />
  );
}
