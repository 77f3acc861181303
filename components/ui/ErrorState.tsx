import { ApiProblem } from '@/hooks/api';
import { Button } from './Button';
import { NoPermission } from './NoPermission';
import { Notice } from './Notice';

export interface ErrorStateProps {
  error: unknown;
  /** What could not be done: "Recordings could not be loaded". */
  title: string;
  onRetry?: () => void;
}

/** Says what failed and what to do; a refusal for want of a role gets its own words. */
export function ErrorState({ error, title, onRetry }: ErrorStateProps) {
  if (error instanceof ApiProblem && error.status === 403) return <NoPermission message={error.message} />;
  const gone = error instanceof ApiProblem && error.status === 404; // asking again finds nothing either
  return (
    <Notice
      tone="vermilion"
      urgent
      title={title}
      actions={onRetry && !gone ? <Button label="Try again" onPress={onRetry} /> : undefined}
    >
      {messageOf(error)}
    </Notice>
  );
}

/** The plain sentence of any failure. */
export function messageOf(error: unknown): string {
  if (error instanceof ApiProblem) return error.message;
  if (error instanceof Error && error.message) return error.message;
  return 'Something went wrong that has no name yet. Try again; if it stays, tell an admin what you did.';
}
