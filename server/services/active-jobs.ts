/** Batch jobs that this process has in hand, by the recording they work on, so that they can be cancelled. */
interface Entry {
  generation: number;
  cancel: () => void;
  ended: Promise<unknown>;
}

export class ActiveJobs {
  private readonly jobs = new Map<string, Entry>();

  /** Remembers a job, begun for a recording's mapping number `generation`, until it ends. */
  async track<T>(
    recordingId: string,
    generation: number,
    job: { result: Promise<T>; cancel(): void },
  ): Promise<T> {
    const ended = job.result.catch(() => undefined);
    const entry = { generation, cancel: () => job.cancel(), ended };
    this.jobs.set(recordingId, entry);
    try {
      return await job.result;
    } finally {
      if (this.jobs.get(recordingId) === entry) this.jobs.delete(recordingId);
    }
  }

  has(recordingId: string): boolean {
    return this.jobs.has(recordingId);
  }

  /** Cancels what works on the recording for a mapping before number `before`, and waits until it has ended. */
  async cancel(recordingId: string, before = Infinity): Promise<void> {
    const job = this.jobs.get(recordingId);
    if (!job || job.generation >= before) return;
    job.cancel();
    await job.ended;
  }

  async cancelAll(): Promise<void> {
    await Promise.all([...this.jobs.keys()].map((id) => this.cancel(id)));
  }
}
