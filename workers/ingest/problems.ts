/** What is wrong with a file, where, and what to do. */
import type { FileRole, IntakeProblem, MapFix } from '@/shared/contracts/recordings';

/** The files cannot be used as they are; nothing of them is kept but the raw upload. */
export class IntakeRejected extends Error {
  constructor(readonly problems: readonly IntakeProblem[]) {
    super(problems[0]?.message ?? 'The files cannot be used.');
    this.name = 'IntakeRejected';
  }
}

export interface ProblemPlace {
  file?: FileRole | null;
  line?: number | null;
  column?: string | null;
}

export const problem = (
  code: string,
  place: ProblemPlace,
  message: string,
  remedy: string,
  fix?: MapFix,
): IntakeProblem => ({
  code,
  file: place.file ?? null,
  line: place.line ?? null,
  column: place.column ?? null,
  message,
  remedy,
  ...(fix && { fix }),
});

/** An IntakeRejected with one problem, to be thrown. */
export const rejection = (...given: Parameters<typeof problem>) => new IntakeRejected([problem(...given)]);

export const FILE_NAMES: Record<FileRole, string> = {
  imu: 'IMU file',
  gnss: 'GNSS file',
  reference: 'reference file',
  imu2: 'second IMU file',
  aids: 'file of the other sensors',
};

/** Text from a file as a message may quote it: short, on one line. */
export const quoted = (text: string) => {
  const plain = text.replace(/[\u0000-\u001f\u007f]+/g, ' ').trim();
  return `“${plain.length > 40 ? `${plain.slice(0, 40)}…` : plain}”`;
};
