import { Notice } from './Notice';

export interface NoPermissionProps {
  /** What one may not do here and who may. */
  message: string;
}

/** In place of a screen or a form that the person's role does not open. */
export function NoPermission({ message }: NoPermissionProps) {
  return (
    <Notice tone="ochre" title="Not open to your role">
      {message}
    </Notice>
  );
}
