import type { ReactNode } from 'react';
import { radius } from '@/constants/theme';
import { Button } from './Button';
import { ModalFrame } from './ModalFrame';
import { Text } from './Text';

export interface DialogProps {
  open: boolean;
  title: string;
  onClose: () => void;
  children?: ReactNode;
  /** Buttons; see ConfirmDialog for the usual pair. */
  footer?: ReactNode;
  width?: number;
}

/** A question or a short form in the middle of the screen. Mounted only while open. */
export function Dialog({ open, title, onClose, children, footer, width = 480 }: DialogProps) {
  if (!open) return null;
  return (
    <ModalFrame
      title={title}
      onClose={onClose}
      footer={footer}
      placement={{
        width: `min(${width}px, calc(100vw - 32px))`,
        maxHeight: 'calc(100dvh - 32px)',
        borderRadius: radius,
        margin: 'auto',
        display: 'flex',
      }}
    >
      {children}
    </ModalFrame>
  );
}

export interface ConfirmDialogProps {
  open: boolean;
  title: string;
  /** What happens, and what will be lost. */
  message: string;
  confirmLabel: string;
  danger?: boolean;
  busy?: boolean;
  /** Keeps the confirming button off, for instance until a name is typed. */
  blocked?: boolean;
  onConfirm: () => void;
  onClose: () => void;
  children?: ReactNode;
}

/** Asks before something that cannot be undone. */
export function ConfirmDialog(props: ConfirmDialogProps) {
  return (
    <Dialog
      open={props.open}
      title={props.title}
      onClose={props.onClose}
      footer={
        <>
          <Button label="Cancel" onPress={props.onClose} />
          <Button
            label={props.confirmLabel}
            kind={props.danger ? 'danger' : 'primary'}
            busy={props.busy}
            disabled={props.blocked}
            onPress={props.onConfirm}
          />
        </>
      }
    >
      <Text>{props.message}</Text>
      {props.children}
    </Dialog>
  );
}
