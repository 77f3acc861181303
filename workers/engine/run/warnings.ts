/** Warnings of a run; of one kind only the first are spelled out. */

export interface RunWarning {
  code: string;
  sentence: string;
  timeS: number | null;
}

/** More warnings of one kind than this are only counted. */
const SPELLED_OUT = 20;

export class Warnings {
  private readonly list: RunWarning[] = [];
  private readonly counts = new Map<string, number>();

  add(code: string, sentence: string, timeS: number): void {
    const count = (this.counts.get(code) ?? 0) + 1;
    this.counts.set(code, count);
    if (count <= SPELLED_OUT) this.list.push({ code, sentence, timeS });
  }

  /** In the order of time, the merely counted ones last. */
  all(): RunWarning[] {
    const rest = [...this.counts]
      .filter(([, count]) => count > SPELLED_OUT)
      .map(([code, count]) => ({ code, sentence: `${count - SPELLED_OUT} more of this kind.`, timeS: null }));
    return [...this.list, ...rest];
  }
}
