import { Notice } from '@/components/ui/Notice';

/** The fault of a form that belongs to no single field. */
export function FormProblem({ message, title }: { message: string | undefined; title: string }) {
  if (!message) return null;
  return (
    <Notice tone="vermilion" urgent title={title}>
      {message}
    </Notice>
  );
}
