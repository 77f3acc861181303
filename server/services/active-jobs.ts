/** Batch jobs that this process has in hand, by the recording they work on, so that they can be cancelled. */
export class ActiveJobs {
  private readonly jobs = new Map<string, { cancel: () => void; ended: Promise<unknown> }>();

  /** Remembers a job until it ends. */
  async track<T>(recordingId: string, job: { result: Promise<T>; cancel(): void }): Promise<T> {
    const ended = job.result.catch(() => undefined);
    const entry = { cancel: () => job.cancel(), ended };
    this.jobs.set(recordingId, entry);
    try {
      return await job.result;
    } finally {
      if (this.jobs.get(recordingId) === entry) this.jobs.delete(recordingId);
    }
  }

  /** Cancels what works on the recording and waits until it has let go of its files. */
  async cancel(recordingId: string): Promise<void> {
    const job = this.jobs.get(recordingId);
    job?.cancel();
    await job?.ended;
  }

  async cancelAll(): Promise<void> {
    await Promise.all([...this.jobs.keys()].map((id) => this.cancel(id)));
  }
}
