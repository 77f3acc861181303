import { EntryRuns } from '@/components/compare/entry-runs';
import type { Entry } from '@/components/compare/use-entries';
import { LiveController, type LiveTransport } from '@/hooks/live/live-controller';
import { defaultParameters } from '@/shared/contracts/parameters';
import type { Run, RunCreateInput, RunSummary } from '@/shared/contracts/runs';

/** Notes what is asked for and answers nothing. */
function start() {
  const posted: RunCreateInput[] = [];
  const closed = { count: 0 };
  const transport = (): LiveTransport => ({
    create: (request) => {
      posted.push(request);
      return new Promise<Run>(() => undefined);
    },
    cancel: async () => undefined,
    fetchRun: () => new Promise<Run>(() => undefined),
    fetchSeries: () => new Promise(() => undefined),
    follow: () => undefined,
    unfollow: () => undefined,
    listen: () => () => undefined,
    close: () => void (closed.count += 1),
  });
  const runs = new EntryRuns(() => new LiveController(transport));
  return { runs, posted, closed };
}

const entry = (key: string, positionScale: number, run: Run | null = null): Entry => {
  const parameters = defaultParameters();
  parameters.gnss.positionScale = positionScale;
  return { ref: 'start', key, name: key, note: '', parameters, outages: [], run, problem: null };
};
const WINDOWS = [{ startS: 10, endS: 70, withhold: 'gnss' as const }];
const asked = { recordingId: 'rec', windows: WINDOWS, settled: true, mayRun: true };
const finished = (of: Entry) =>
  ({
    id: 'run-7',
    recordingId: 'rec',
    state: 'done',
    parameters: of.parameters!,
    outages: WINDOWS,
    smooth: false,
    errorBudget: false,
    hasSeries: false,
    summary: { endS: 100 } as RunSummary,
  }) as Run;

test('each entry is run over the same windows, once', () => {
  const { runs, posted } = start();
  const entries = [entry('a', 1), entry('b', 2)];
  runs.sync(entries, asked);
  runs.sync(entries, asked);
  expect(posted.map(({ parameters }) => parameters?.gnss?.positionScale)).toEqual([1, 2]);
  expect(posted.map(({ outages }) => outages)).toEqual([WINDOWS, WINDOWS]);
  expect(new Set(posted.map(({ benchId }) => benchId)).size).toBe(2);
});

test('a finished run over these windows is shown as it is; over others it is run anew', async () => {
  const { runs, posted } = start();
  const one = entry('a', 1);
  const known = { ...one, run: finished(one) };
  runs.sync([known], asked);
  await Promise.resolve();
  expect(posted).toEqual([]);
  expect(runs.get('a')?.state.runId).toBe('run-7');
  runs.sync([known], { ...asked, windows: [] });
  expect(posted).toHaveLength(1);
});

test('who may run nothing sees finished runs only', () => {
  const { runs, posted } = start();
  const one = entry('a', 1);
  runs.sync([{ ...one, run: finished(one) }, entry('b', 2)], { ...asked, windows: [], mayRun: false });
  expect(posted).toEqual([]);
  expect(runs.get('a')?.state.runId).toBe('run-7');
  expect(runs.get('b')?.state.phase).toBe('idle');
});

test('what is compared no more is closed', () => {
  const { runs, closed } = start();
  runs.sync([entry('a', 1), entry('b', 2)], asked);
  runs.sync([entry('b', 2)], asked);
  expect(closed.count).toBe(1);
  expect(runs.get('a')).toBeNull();
  runs.close();
  expect(closed.count).toBe(2);
});
