import type { ReactNode } from 'react';

export interface FormProps {
  /** Names the form for the screen reader. */
  label: string;
  gap?: number;
  children: ReactNode;
}

/** A real form element, so that password managers and the screen reader know one; the page itself sends it. */
export function Form({ label, gap = 16, children }: FormProps) {
  return (
    <form
      aria-label={label}
      noValidate
      onSubmit={(event) => event.preventDefault()}
      style={{ display: 'flex', flexDirection: 'column', gap, margin: 0 }}
    >
      {children}
    </form>
  );
}
