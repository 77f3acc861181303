import type { Frame } from '@/shared/contracts/frames';
import { NetworkProblem } from '@/hooks/api';
import { defaultParameters } from '@/shared/contracts/parameters';
import type { Run, RunCreateInput, RunSummary } from '@/shared/contracts/runs';
import {
  DRAG_LEAST_MS,
  DRAG_MOST_MS,
  LiveController,
  type LiveHandlers,
  type LiveTransport,
} from '@/hooks/live/live-controller';
import { makeFrame } from './frames';

const request = (scale: number): RunCreateInput => ({
  recordingId: 'recording',
  parameters: { gnss: { positionScale: scale } },
  outages: [],
});
const summary = { endS: 100, durationS: 100 } as RunSummary;

/** A server in a few lines: answers each POST when told to, and notes what was asked. */
class Bench implements LiveTransport {
  handlers!: LiveHandlers; // given by listen()
  posted: RunCreateInput[] = [];
  followed: string[] = [];
  unfollowed: string[] = [];
  seriesAsked: string[] = [];
  series: (runId: string) => Promise<Frame> = async (runId) =>
    makeFrame(runId, 0, { state: [0, 50, 100] }, { progress: 1, toS: 100, value: 77 });
  runs: (runId: string) => Promise<Run> = async (runId) => run(runId, 'running');
  private waiting: { resolve: (run: Run) => void; reject: (error: Error) => void }[] = [];
  now = 0;
  readonly live = new LiveController(
    () => this,
    () => this.now,
  );
  private readonly closeLive: () => void;

  constructor() {
    this.closeLive = this.live.open();
  }

  create = (body: RunCreateInput) => {
    this.posted.push(body);
    return new Promise<Run>((resolve, reject) => this.waiting.push({ resolve, reject }));
  };
  cancel = async () => undefined;
  fetchRun = (runId: string) => this.runs(runId);
  fetchSeries = (runId: string) => {
    this.seriesAsked.push(runId);
    return this.series(runId);
  };
  follow = (runId: string) => void this.followed.push(runId);
  unfollow = (runId: string) => void this.unfollowed.push(runId);
  listen = (handlers: LiveHandlers) => {
    this.handlers = handlers;
    return () => undefined;
  };
  close = () => undefined;

  /** Answers the oldest open POST. */
  async answer(id: string) {
    this.waiting.shift()!.resolve(run(id, 'queued'));
    await settle();
  }
  async refuse(message: string) {
    this.waiting.shift()!.reject(new Error(message));
    await settle();
  }
  /** The oldest open POST finds no server. */
  async lose() {
    this.waiting.shift()!.reject(new NetworkProblem());
    await settle();
  }
  end() {
    this.closeLive();
  }
  currentTimes() {
    const data = this.live.data.current!;
    return Array.from(data.column('state', 'time_s').subarray(0, data.table('state').length));
  }
}

const run = (id: string, state: Run['state'], more: Partial<Run> = {}): Run => ({
  id,
  recordingId: 'recording',
  recordingName: 'Breakwater loop',
  state,
  progress: 0,
  failure: null,
  parameters: defaultParameters(),
  outages: [],
  outputRateHz: 10,
  smooth: false,
  errorBudget: false,
  createdAt: '2031-01-01T00:00:00Z',
  createdBy: 'Ilsa',
  finishedAt: null,
  hasSeries: false,
  summary: null,
  provenance: null,
  ...more,
});
const settle = async () => {
  for (let i = 0; i < 10; i++) await Promise.resolve();
};

beforeEach(() => jest.useFakeTimers());
afterEach(() => jest.useRealTimers());

describe('one run', () => {
  it('goes from the change through frames to the summary', async () => {
    const bench = new Bench();
    bench.live.change(request(1));
    expect(bench.live.state.phase).toBe('starting');
    await bench.answer('a');
    expect(bench.followed).toEqual(['a']);
    bench.handlers.frame(makeFrame('a', 0, { state: [0, 50] }, { progress: 0.5 }));
    expect(bench.live.state).toMatchObject({ phase: 'running', progress: 0.5 });
    bench.now = 280;
    bench.handlers.frame(makeFrame('a', 1, { state: [100] }, { progress: 1 }));
    bench.handlers.summary('a', summary);
    await settle();
    expect(bench.live.state).toMatchObject({ phase: 'done', summary, summaryRunId: 'a', tookS: 0.28 });
    expect(bench.currentTimes()).toEqual([0, 50, 100]);
    expect(bench.seriesAsked).toEqual([]);
    bench.end();
  });

  it('says in words why a run could not be started, keeps the curves, and retries', async () => {
    const bench = new Bench();
    bench.live.change(request(1));
    await bench.answer('a');
    bench.handlers.frame(makeFrame('a', 0, { state: [0, 100] }, { progress: 1 }));
    bench.handlers.summary('a', summary);
    await settle();
    bench.live.change(request(2));
    await bench.refuse('The recording is being decoded again. Wait until it is ready.');
    expect(bench.live.state).toMatchObject({
      phase: 'failed',
      reason: 'The recording is being decoded again. Wait until it is ready.',
      summary,
    });
    expect(bench.currentTimes()).toEqual([0, 100]);
    bench.live.retry();
    expect(bench.posted).toEqual([request(1), request(2), request(2)]);
    bench.end();
  });

  it('tells why a started run failed', async () => {
    const bench = new Bench();
    bench.live.change(request(1));
    await bench.answer('a');
    bench.handlers.failed({ runId: 'a', state: 'failed', reason: 'The heading could not be found.' });
    expect(bench.live.state).toMatchObject({ phase: 'failed', reason: 'The heading could not be found.' });
    bench.end();
  });
});

describe('the newest wins', () => {
  it('has one request on its way and sends only the latest of what came meanwhile', async () => {
    const bench = new Bench();
    bench.live.change(request(1));
    for (let scale = 2; scale <= 9; scale++) bench.live.change(request(scale));
    expect(bench.posted).toEqual([request(1)]);
    await bench.answer('a');
    expect(bench.posted).toEqual([request(1), request(9)]);
    await bench.answer('b');
    expect(bench.unfollowed).toEqual(['a']);
    bench.end();
  });

  it('ignores frames, summary and failure of a superseded run', async () => {
    const bench = new Bench();
    bench.live.change(request(1));
    await bench.answer('a');
    bench.live.change(request(2));
    await bench.answer('b');
    bench.handlers.frame(makeFrame('a', 0, { state: [0, 1, 2] }));
    bench.handlers.summary('a', summary);
    bench.handlers.failed({ runId: 'a', state: 'superseded', reason: '' });
    await settle();
    expect(bench.live.data.current).toBeNull();
    expect(bench.live.state).toMatchObject({ phase: 'running', runId: 'b', summary: null });
    bench.end();
  });

  it('keeps the old curve until the new one has drawn, then only for what is not reached yet', async () => {
    const bench = new Bench();
    bench.live.change(request(1));
    await bench.answer('a');
    bench.handlers.frame(makeFrame('a', 0, { state: [0, 100] }, { progress: 1 }));
    bench.handlers.summary('a', summary);
    await settle();
    bench.live.change(request(2));
    await bench.answer('b');
    expect(bench.live.data.current?.runId).toBe('a');
    bench.handlers.frame(makeFrame('b', 0, { state: [0, 30] }));
    expect(bench.live.data.current?.runId).toBe('b');
    expect(bench.live.data.previous?.runId).toBe('a');
    // A third run that overtakes the half-drawn second one: behind it stands the whole first.
    bench.live.change(request(3));
    await bench.answer('c');
    bench.handlers.frame(makeFrame('c', 0, { state: [0, 10] }));
    expect([bench.live.data.current?.runId, bench.live.data.previous?.runId]).toEqual(['c', 'a']);
    bench.handlers.frame(makeFrame('c', 1, { state: [100] }, { progress: 1 }));
    bench.handlers.summary('c', summary);
    await settle();
    expect([bench.live.data.current?.runId, bench.live.data.previous]).toEqual(['c', null]);
    bench.end();
  });

  it('lets a run draw before the next one while the slider still moves', async () => {
    const bench = new Bench();
    bench.live.change(request(1), false);
    await bench.answer('a');
    bench.live.change(request(2), false);
    expect(bench.posted).toHaveLength(1);
    bench.now = DRAG_LEAST_MS - 1;
    bench.handlers.frame(makeFrame('a', 0, { state: [0] }));
    expect(bench.posted).toHaveLength(1);
    bench.now = DRAG_LEAST_MS + 1;
    bench.handlers.frame(makeFrame('a', 1, { state: [1] }));
    expect(bench.posted).toEqual([request(1), request(2)]);
    bench.end();
  });

  it('does not wait for ever for a first frame, and not at all once the slider is let go', async () => {
    const bench = new Bench();
    bench.live.change(request(1), false);
    await bench.answer('a');
    bench.live.change(request(2), false);
    bench.now = DRAG_MOST_MS;
    jest.advanceTimersByTime(DRAG_MOST_MS);
    expect(bench.posted).toHaveLength(2);
    await bench.answer('b');
    bench.live.change(request(3), false);
    bench.live.change(request(3), true);
    expect(bench.posted).toHaveLength(3);
    bench.end();
  });
});

describe('what the line loses', () => {
  it('fetches the series when a frame is missing', async () => {
    const bench = new Bench();
    bench.live.change(request(1));
    await bench.answer('a');
    bench.handlers.frame(makeFrame('a', 0, { state: [0] }));
    bench.handlers.frame(makeFrame('a', 2, { state: [20] }));
    await settle();
    expect(bench.seriesAsked).toEqual(['a']);
    expect(bench.currentTimes()).toEqual([0, 50, 100]);
    bench.end();
  });

  it('fetches at the end where the server had no series before, or the last frames were dropped', async () => {
    const bench = new Bench();
    bench.series = async () => Promise.reject(new Error('The run has no series yet.'));
    bench.live.change(request(1));
    await bench.answer('a');
    bench.handlers.frame(makeFrame('a', 1, { state: [20] }));
    await settle();
    expect(bench.currentTimes()).toEqual([20]);
    bench.series = async () => makeFrame('a', 0, { state: [0, 20, 100] }, { progress: 1 });
    bench.handlers.summary('a', summary);
    await settle();
    expect(bench.currentTimes()).toEqual([0, 20, 100]);
    expect(bench.live.state.phase).toBe('done');
    bench.end();
  });

  it('does not call a run done whose curves could not be had', async () => {
    const bench = new Bench();
    bench.series = async () => Promise.reject(new Error('The server does not answer.'));
    bench.live.change(request(1));
    await bench.answer('a');
    bench.handlers.summary('a', summary);
    await settle();
    expect(bench.live.state).toMatchObject({
      phase: 'failed',
      reason: 'The server does not answer.',
      summary: null,
    });
    bench.end();
  });

  it('follows on after a break, or fetches the run that ended meanwhile', async () => {
    const bench = new Bench();
    bench.live.change(request(1));
    await bench.answer('a');
    bench.handlers.frame(makeFrame('a', 0, { state: [0] }));
    bench.handlers.reconnected();
    await settle();
    expect(bench.followed).toEqual(['a', 'a']);
    expect(bench.seriesAsked).toEqual(['a']);
    bench.runs = async (runId) => run(runId, 'done', { summary, hasSeries: true });
    bench.handlers.reconnected();
    await settle();
    expect(bench.live.state).toMatchObject({ phase: 'done', summaryRunId: 'a' });
    bench.end();
  });

  it('says so when the run was lost during the break', async () => {
    const bench = new Bench();
    bench.live.change(request(1));
    await bench.answer('a');
    bench.runs = async (runId) =>
      run(runId, 'failed', { failure: 'The computing process stopped. Run it again.' });
    bench.handlers.reconnected();
    await settle();
    expect(bench.live.state).toMatchObject({
      phase: 'failed',
      reason: 'The computing process stopped. Run it again.',
    });
    bench.end();
  });
});

describe('a server that is away', () => {
  it('is known while the run goes, and forgotten when it is back', async () => {
    const bench = new Bench();
    bench.live.change(request(1));
    await bench.answer('a');
    bench.handlers.lost();
    expect(bench.live.state).toMatchObject({ phase: 'running', connected: false });
    bench.runs = async (runId) => run(runId, 'failed', { failure: 'The server was stopped.' });
    bench.handlers.reconnected();
    await settle();
    expect(bench.live.state).toMatchObject({ phase: 'failed', connected: true });
    bench.end();
  });

  it('gets the change that it did not hear as soon as it answers, and that once', async () => {
    const bench = new Bench();
    bench.live.change(request(1));
    await bench.lose();
    bench.handlers.lost();
    expect(bench.live.state).toMatchObject({ phase: 'failed', connected: false, unsent: true });
    bench.handlers.reconnected();
    expect(bench.live.state).toMatchObject({ phase: 'starting', connected: true, unsent: false });
    await bench.answer('a');
    bench.handlers.reconnected();
    await settle();
    expect(bench.posted).toEqual([request(1), request(1)]);
    bench.end();
  });

  it('is not asked again for what it refused', async () => {
    const bench = new Bench();
    bench.live.change(request(1));
    await bench.refuse('The recording is being decoded again.');
    bench.handlers.lost();
    bench.handlers.reconnected();
    expect(bench.posted).toHaveLength(1);
    bench.end();
  });
});

describe('for those who may only look', () => {
  it('shows a finished run without starting one', async () => {
    const bench = new Bench();
    await bench.live.show(run('old', 'done', { summary, hasSeries: true }));
    expect(bench.posted).toEqual([]);
    expect(bench.live.state).toMatchObject({ phase: 'done', summaryRunId: 'old' });
    expect(bench.currentTimes()).toEqual([0, 50, 100]);
    bench.end();
  });
});
