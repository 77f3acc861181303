import { useState, type ReactNode } from 'react';
import { ConfirmDialog, type ConfirmDialogProps } from './Dialog';
import { messageOf } from './ErrorState';
import { Field } from './Field';
import { Notice } from './Notice';

export interface TypedConfirmProps extends Pick<
  ConfirmDialogProps,
  'title' | 'message' | 'confirmLabel' | 'busy' | 'onClose'
> {
  /** What has to be typed. */
  name: string;
  onConfirm: (typed: string) => void;
  /** Why it was not done. */
  error: unknown;
  /** What will be lost. */
  children?: ReactNode;
}

/** Asks for a name before something large that cannot be undone. */
export function TypedConfirm({ name, onConfirm, error, children, ...rest }: TypedConfirmProps) {
  const [typed, setTyped] = useState('');
  return (
    <ConfirmDialog
      {...rest}
      open
      danger
      blocked={typed.trim() !== name}
      onConfirm={() => onConfirm(typed.trim())}
    >
      {children}
      <Field
        label={`Type the name to confirm: ${name}`}
        value={typed}
        onChangeText={setTyped}
        autoCapitalize="none"
        autoComplete="off"
      />
      {error ? (
        <Notice tone="vermilion" urgent title="Not deleted">
          {messageOf(error)}
        </Notice>
      ) : null}
    </ConfirmDialog>
  );
}
