/** What people are told when a decoding could not be done, for reasons that do not lie in its files' columns. */
import type { IntakeProblem } from '@/shared/contracts/recordings';
import { JobFailed, WorkerCrashed } from '@/workers';

/** Passing troubles: the queue tries again before anybody is told. */
const PASSING = new Set(['worker-start', 'store-unreachable']);
/** Codes of the store: the system's own, and those of object storage. */
const OF_STORE = /^(E[A-Z]+$|store-)/;

/** A problem without a place in a file. */
export const problem = (code: string, message: string, remedy: string): IntakeProblem => ({
  file: null,
  line: null,
  column: null,
  code,
  message,
  remedy,
});

/** What to tell people when trying again does not help; null: try again. */
export function problemOf(error: unknown, lastAttempt: boolean): IntakeProblem | null {
  if (error instanceof JobFailed && (lastAttempt || !PASSING.has(error.code))) {
    const remedy = OF_STORE.test(error.code)
      ? 'The files are kept. Tell the operator; then decode the recording again.'
      : 'Mend the file and upload it again, or correct the channel map.';
    return problem(error.code, error.message, remedy);
  }
  if (error instanceof WorkerCrashed && lastAttempt) {
    const message = 'The computing process stopped each time it worked on these files.';
    return problem('worker-crashed', message, 'Upload a shorter piece, or tell the operator.');
  }
  return null;
}
