import { useState, type ReactNode } from 'react';
import { NO_OPTIONS, type BenchConfig } from '@/components/bench/bench-start';
import { writePath } from '@/shared/parameters/parameter-path';
import type { Bench } from '@/components/bench/use-bench';
import { ChartGroup } from '@/components/charts/chart-group';
import { LiveController, type LiveHandlers, type LiveTransport } from '@/hooks/live/live-controller';
import { defaultParameters, type Parameters as FilterParameters } from '@/shared/contracts/parameters';
import type { Recording } from '@/shared/contracts/recordings';
import { recordingOf } from '../recordings/fixtures';

const STRIP: NonNullable<Recording['strip']> = {
  startS: 0,
  endS: 100,
  speedMPerS: [0, 1, 2],
  gnssFixes: [5, 5, 5],
  clippedS: [],
  gapsS: [],
};

export interface BenchSeen {
  config: BenchConfig;
  live: LiveController;
  /** What the server says on the line. */
  line: () => LiveHandlers;
}

export interface BenchStandProps {
  parameters?: FilterParameters;
  locked?: string;
  /** Told at each rendering. */
  onBench: (seen: BenchSeen) => void;
  children: (bench: Bench) => ReactNode;
}

/** A bench whose server never answers: what is set is kept, as on the real one. */
export function BenchStand({ parameters = defaultParameters(), locked, onBench, children }: BenchStandProps) {
  const [config, setConfig] = useState<BenchConfig>({ parameters, outages: [], options: NO_OPTIONS });
  const [parts] = useState(makeParts);
  const write = (changes: Parameters<Bench['setParameters']>[0], from: BenchConfig) => ({
    ...from,
    parameters: changes.reduce((made, { path, value }) => writePath(made, path, value), from.parameters),
  });
  const bench: Bench = {
    id: '00000000-0000-4000-8000-000000000000',
    start: {
      recording: { ...recordingOf(), strip: STRIP },
      set: null,
      from: parameters,
      config,
      baseline: { name: 'start values', parameters, runId: null },
      view: null,
      notes: [],
    },
    config,
    setParameter: (path, value) => setConfig((old) => write([{ path, value }], old)),
    setParameters: (changes) => setConfig((old) => write(changes, old)),
    setOutages: (outages) => setConfig((old) => ({ ...old, outages })),
    setOptions: (options) => setConfig((old) => ({ ...old, options })),
    canUndo: false,
    canRedo: false,
    undo: () => undefined,
    redo: () => undefined,
    live: parts.live,
    group: parts.group,
    source: { curves: () => ({ current: null, previous: null, ghost: null }), summary: () => null },
    baseline: { name: 'start values', parameters, runId: null },
    baselineSummary: null,
    pinCurrent: () => undefined,
    adopt: () => undefined,
    settle: () => undefined,
    locked: locked ?? null,
  };
  onBench({ config, live: parts.live, line: parts.line });
  return children(bench);
}

/** The controller on a line of our own: POSTs stay open, and the test speaks for the server. */
function makeParts() {
  let handlers: LiveHandlers | null = null;
  const transport: LiveTransport = {
    create: () => new Promise(() => undefined),
    cancel: async () => undefined,
    fetchRun: () => new Promise(() => undefined),
    fetchSeries: () => new Promise(() => undefined),
    follow: () => undefined,
    unfollow: () => undefined,
    listen: (given) => {
      handlers = given;
      return () => undefined;
    },
    close: () => undefined,
  };
  const live = new LiveController(() => transport);
  live.open();
  const line = () => {
    if (!handlers) throw new Error('Nobody listens yet.');
    return handlers;
  };
  return { live, line, group: new ChartGroup([STRIP.startS, STRIP.endS]) };
}
