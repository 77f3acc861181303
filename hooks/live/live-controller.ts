/**
 * One open bench's conversation with the server: every change becomes a run, the newest wins, its frames become curves.
 * Framework-free: React reads `state` and `data`, tests put their own transport below.
 */
import type { Frame } from '@/shared/contracts/frames';
import type { RunFailed, RunProgress } from '@/shared/contracts/live';
import type { Run, RunCreateInput, RunSummary } from '@/shared/contracts/runs';
import { NetworkProblem } from '../api';
import { RunData } from './run-data';

export interface LiveHandlers {
  frame: (frame: Frame) => void;
  progress: (message: RunProgress) => void;
  summary: (runId: string, summary: RunSummary) => void;
  failed: (message: RunFailed) => void;
  /** The connection broke, or could not be made; it is tried again. */
  lost: () => void;
  /** The connection is back after a break. */
  reconnected: () => void;
}

/** What the controller needs from outside; use-live-run.ts makes it of fetch and socket.io. */
export interface LiveTransport {
  create: (request: RunCreateInput) => Promise<Run>;
  cancel: (runId: string) => Promise<void>;
  fetchRun: (runId: string) => Promise<Run>;
  /** The run's series so far as one frame; refuses while there is none. */
  fetchSeries: (runId: string) => Promise<Frame>;
  follow: (runId: string) => void;
  unfollow: (runId: string) => void;
  /** Answers a function that stops listening. */
  listen: (handlers: LiveHandlers) => () => void;
  close: () => void;
}

export type LivePhase = 'idle' | 'starting' | 'running' | 'done' | 'failed' | 'cancelled';

export interface LiveState {
  phase: LivePhase;
  /** False while the server cannot be reached: nothing is heard of the run until it can. */
  connected: boolean;
  /** The last change could not be sent; it is sent when the server answers again. */
  unsent: boolean;
  runId: string | null;
  progress: number;
  /** Of the run whose curves are complete; kept while a newer one is on its way. */
  summary: RunSummary | null;
  /** The run that `summary` belongs to, and what it was asked to do. */
  summaryRunId: string | null;
  summaryRequest: RunCreateInput | null;
  /** Why it failed or was cancelled, in plain words. */
  reason: string | null;
  /** From the change to the summary, s; null while it goes. */
  tookS: number | null;
}

const IDLE: LiveState = {
  phase: 'idle',
  connected: true,
  unsent: false,
  runId: null,
  progress: 0,
  summary: null,
  summaryRunId: null,
  summaryRequest: null,
  reason: null,
  tookS: null,
};

/** While a slider moves, a run goes on at least this long before the next takes its place, ms … */
export const DRAG_LEAST_MS = 120;
/** … and at most this long where it has drawn nothing yet. */
export const DRAG_MOST_MS = 400;

export class LiveController {
  private current: LiveState = IDLE;
  private wanted: { request: RunCreateInput; settled: boolean } | null = null;
  private lastRequest: RunCreateInput | null = null;
  private activeRequest: RunCreateInput | null = null;
  private posting = false;
  private startedAt = -Infinity;
  private answeredAt = -Infinity;
  private timer: ReturnType<typeof setTimeout> | null = null;
  private readonly stateListeners = new Set<() => void>();
  private readonly dataListeners = new Set<() => void>();

  /** The run that is coming in; null before the first. */
  private incoming: RunData | null = null;
  /** Curves on screen: the newest run that has drawn anything, and the one before for what it has not reached. */
  data: { current: RunData | null; previous: RunData | null } = { current: null, previous: null };

  private transport: LiveTransport | null = null;

  /** Nothing is sent before `open`. */
  constructor(
    private readonly connect: () => LiveTransport,
    private readonly now: () => number = () => performance.now(),
  ) {}

  /** Connects, and sends what was asked for meanwhile. Answers a function that disconnects. */
  open(): () => void {
    const transport = this.connect();
    this.transport = transport;
    const stopListening = transport.listen({
      frame: (frame) => this.onFrame(frame),
      progress: (message) => this.onProgress(message),
      summary: (runId, summary) => void this.onSummary(runId, summary),
      failed: (message) => this.onFailed(message),
      lost: () => this.patch({ connected: false }),
      reconnected: () => void this.onReconnected(),
    });
    this.pump();
    return () => {
      if (this.timer) clearTimeout(this.timer);
      if (this.current.runId) transport.unfollow(this.current.runId);
      stopListening();
      transport.close();
      this.transport = null;
    };
  }

  get state(): LiveState {
    return this.current;
  }
  getState = (): LiveState => this.current;

  subscribe = (listener: () => void): (() => void) => {
    this.stateListeners.add(listener);
    return () => this.stateListeners.delete(listener);
  };
  /** Hears of every arrived frame; redraw then. */
  subscribeData = (listener: () => void): (() => void) => {
    this.dataListeners.add(listener);
    return () => this.dataListeners.delete(listener);
  };

  /** Asks for a run. `settled` false: the person is still dragging, so that runs may be spaced out. */
  change(request: RunCreateInput, settled = true): void {
    this.wanted = { request, settled };
    this.lastRequest = request;
    this.pump();
  }

  /** Runs the last request again. */
  retry(): void {
    if (this.lastRequest) this.change(this.lastRequest);
  }

  /** Stops the run that is going. */
  async cancel(): Promise<void> {
    this.wanted = null;
    const { runId, phase } = this.current;
    if (!runId || phase !== 'running') return;
    await this.transport?.cancel(runId).catch(() => undefined);
  }

  /** Shows a run without starting one: a finished one, or one that somebody else has going. */
  async show(run: Run): Promise<void> {
    this.wanted = null;
    this.startedAt = this.now();
    this.begin(run.id, requestOf(run));
    if (isOver(run)) await this.finishFrom(run);
  }

  private pump(): void {
    if (this.timer) clearTimeout(this.timer);
    this.timer = null;
    const { transport } = this;
    if (!this.wanted || this.posting || !transport) return;
    const going = this.current.phase === 'running' || this.current.phase === 'starting';
    const patience = this.incoming?.empty ? DRAG_MOST_MS : DRAG_LEAST_MS;
    const wait = this.answeredAt + patience - this.now();
    if (going && !this.wanted.settled && wait > 0) {
      this.timer = setTimeout(() => this.pump(), wait);
      return;
    }
    const { request } = this.wanted;
    this.wanted = null;
    void this.start(transport, request);
  }

  private async start(transport: LiveTransport, request: RunCreateInput): Promise<void> {
    this.posting = true;
    this.startedAt = this.now();
    this.patch({ phase: 'starting', unsent: false, reason: null, tookS: null });
    try {
      const run = await transport.create(request);
      if (this.transport !== transport) return;
      this.begin(run.id, request);
      if (isOver(run)) await this.finishFrom(run);
    } catch (error) {
      const unsent = error instanceof NetworkProblem;
      this.patch({ phase: 'failed', unsent, reason: wordsOf(error) });
    } finally {
      this.posting = false;
      this.pump();
    }
  }

  /** From here on only frames of `runId` count. */
  private begin(runId: string, request: RunCreateInput): void {
    const before = this.current.runId;
    if (before && before !== runId) this.transport?.unfollow(before);
    this.incoming = new RunData(runId);
    this.answeredAt = this.now();
    this.activeRequest = request;
    this.patch({ phase: 'running', runId, progress: 0, reason: null });
    this.transport?.follow(runId);
  }

  private onFrame(frame: Frame): void {
    const { incoming } = this;
    if (!incoming || frame.head.runId !== incoming.runId || incoming.complete) return;
    const result = incoming.append(frame);
    if (result === 'ignored') return;
    this.showIncoming();
    this.patch({ progress: incoming.progress });
    if (this.wanted) this.pump();
    // Where the server has no series before the end, the summary brings it.
    if (result === 'gap') void this.fetchInto(incoming, false);
  }

  /** The first rows of a newer run put it on screen; the one before stays behind for what is not reached yet. */
  private showIncoming(): void {
    const { incoming, data } = this;
    if (incoming && data.current !== incoming) {
      const { current, previous } = data;
      const fuller = !current || (previous && previous.toS > current.toS) ? previous : current;
      this.data = { current: incoming, previous: fuller };
    }
    if (incoming?.complete) this.data = { current: incoming, previous: null };
    for (const listener of this.dataListeners) listener();
  }

  private onProgress(message: RunProgress): void {
    if (message.runId !== this.current.runId || this.current.phase !== 'running') return;
    this.patch({ progress: Math.max(this.current.progress, message.progress) });
  }

  private async onSummary(runId: string, summary: RunSummary): Promise<void> {
    const { incoming } = this;
    if (!incoming || runId !== incoming.runId || incoming.complete) return;
    if (incoming.holed || incoming.empty || !reached(incoming, summary)) {
      const problem = await this.fetchInto(incoming, true);
      if (this.incoming !== incoming) return;
      if (problem) return this.patch({ phase: 'failed', reason: problem });
    }
    this.complete(incoming, summary);
  }

  private complete(data: RunData, summary: RunSummary): void {
    if (!data.complete) data.finish();
    this.showIncoming();
    this.patch({
      phase: 'done',
      progress: 1,
      summary,
      summaryRunId: data.runId,
      summaryRequest: this.activeRequest,
      reason: null,
      tookS: Math.max(0, this.now() - this.startedAt) / 1000,
    });
    this.pump();
  }

  private onFailed(message: RunFailed): void {
    if (message.runId !== this.current.runId) return;
    // Superseded by our own next change: its POST is on the way, and says the rest.
    if (message.state === 'superseded' && (this.posting || this.wanted)) return;
    this.patch({ phase: message.state === 'failed' ? 'failed' : 'cancelled', reason: message.reason });
    this.pump();
  }

  /** After a break the run may have gone on or ended unheard. */
  private async onReconnected(): Promise<void> {
    const { runId, phase, unsent } = this.current;
    const { transport } = this;
    this.patch({ connected: true });
    if (unsent) return this.retry();
    if (!transport || !runId || phase !== 'running') return;
    transport.follow(runId);
    try {
      const run = await transport.fetchRun(runId);
      if (this.current.runId !== runId || this.current.phase !== 'running') return;
      if (isOver(run)) await this.finishFrom(run);
      else if (this.incoming) await this.fetchInto(this.incoming, false);
    } catch (error) {
      if (this.current.runId === runId) this.patch({ phase: 'failed', reason: wordsOf(error) });
    }
  }

  /** Fetches all that the run has so far. Answers what went wrong, in words, or null. */
  private async fetchInto(data: RunData, complete: boolean): Promise<string | null> {
    try {
      const frame = await this.transport?.fetchSeries(data.runId);
      if (!frame) return null;
      if (this.incoming !== data || data.complete) return null;
      data.replace(frame, complete);
      this.showIncoming();
      return null;
    } catch (error) {
      return wordsOf(error);
    }
  }

  private async finishFrom(run: Run): Promise<void> {
    const { incoming } = this;
    if (!incoming || incoming.runId !== run.id) return;
    if (run.state !== 'done' || !run.summary) {
      const reason =
        run.failure ??
        (run.state === 'superseded' ? 'A newer run took its place.' : 'The run was cancelled.');
      this.patch({ phase: run.state === 'failed' ? 'failed' : 'cancelled', reason });
      return;
    }
    const problem = run.hasSeries ? await this.fetchInto(incoming, true) : null;
    if (this.incoming !== incoming) return;
    if (problem) return this.patch({ phase: 'failed', reason: problem });
    this.complete(incoming, run.summary);
  }

  private patch(change: Partial<LiveState>): void {
    this.current = { ...this.current, ...change };
    for (const listener of this.stateListeners) listener();
  }
}

const isOver = (run: Run) => run.state !== 'queued' && run.state !== 'running';

/** Whether the frames went to the end; the last one may have been dropped without a later one to tell. */
const reached = (data: RunData, summary: RunSummary) => data.toS >= summary.endS - 1e-6 || data.progress >= 1;

const requestOf = (run: Run): RunCreateInput => ({
  recordingId: run.recordingId,
  parameters: run.parameters,
  outages: run.outages,
  smooth: run.smooth,
  errorBudget: run.errorBudget,
});

const wordsOf = (error: unknown) =>
  error instanceof Error && error.message ? error.message : 'The run could not be started. Try again.';
