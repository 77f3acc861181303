/** A recording of 4 h at 200 Hz: what a piece costs the server, and a step of a pan and of a zoom once the pieces are there. */
import type { Browser } from 'playwright-core';
import { ALL_CHANNELS } from '@/components/recordings/channel-content';
import type { Piece } from '@/hooks/finer/splice';
import { tilesOf } from '@/hooks/finer/tiles';
import type { Series } from '@/shared/contracts/recordings';
import { createRandom } from '@/workers/engine/random';
import type { RecordingColumns } from '@/workers/engine/types';
import { seriesOf } from '@/workers/jobs/recording-series';
import type { ChartsBench } from './harness';
import { openHarness } from './harness-page';
import { stepped } from './main-thread';
import { line, longestTask, spread } from './print';

const HOURS = 4;
const RATE_HZ = 200;
const COARSE_POINTS = 1500;
const PIECE_POINTS = 2400;
const STEPS = 40;
/** Seconds in view, from much to little. */
const SPANS_S = [3600, 600, 60, 5];

export async function benchLook(browser: Browser): Promise<void> {
  const columns = noisyRecording();
  const whole = [0, HOURS * 3600] as const;
  console.log(
    `\nPan and zoom: ${HOURS} h at ${RATE_HZ} Hz, four charts, phone viewport, once the pieces are there`,
  );
  const coarse = await timed('the whole', columns, null, COARSE_POINTS);
  const page = await openHarness(browser);
  try {
    for (const span of SPANS_S) {
      const view: [number, number] = [7000, 7000 + span];
      const pieces: Piece<Series>[] = [];
      for (const { fromS, toS } of tilesOf(view, whole))
        pieces.push({
          span: [fromS, toS],
          data: await timed(`a piece of ${(toS - fromS).toFixed(0)} s`, columns, [fromS, toS], PIECE_POINTS),
        });
      for (const how of ['pan', 'zoom'] as const) {
        await page.evaluate(
          (input) => (globalThis as unknown as { chartsBench: ChartsBench }).chartsBench.look(...input),
          [coarse, pieces, view, how] as Parameters<ChartsBench['look']>,
        );
        const { millis, longTasks } = await stepped(page, STEPS, 50);
        line(`${how}, ${span} s in view, p50 / p95 / max`, `${spread(millis)} ms`, 'goal ≤ 50 ms a step');
        if (longTasks.length > 0) line('', longestTask(longTasks), 'longest task');
      }
    }
  } finally {
    await page.context().close();
  }
}

async function timed(what: string, columns: RecordingColumns, span: [number, number] | null, points: number) {
  const begun = performance.now();
  const job = { channels: [...ALL_CHANNELS], fromS: span?.[0] ?? null, toS: span?.[1] ?? null, points };
  const series = await seriesOf(columns, job, { breathe: () => Promise.resolve() });
  line(`thinning of ${what}`, `${(performance.now() - begun).toFixed(0)} ms`);
  return series;
}

/** Noise is the hardest to draw: every pixel column is as high as the chart. */
function noisyRecording(): RecordingColumns {
  const random = createRandom(4);
  const noise = (length: number, size: number) =>
    Float64Array.from({ length }, () => size * (random.uniform() + random.uniform() - 1));
  const samples = HOURS * 3600 * RATE_HZ;
  const fixes = HOURS * 3600 * 5;
  const three = (length: number, size: number) =>
    [noise(length, size), noise(length, size), noise(length, size)] as const;
  const place = (degrees: number) => noise(fixes, 1e-5).map((value) => value + (degrees * Math.PI) / 180);
  return {
    imu: {
      timeS: Float64Array.from({ length: samples }, (_, i) => (i + 1) / RATE_HZ),
      gyro: three(samples, 0.3),
      accel: three(samples, 5),
      sampling: 'mean-rate',
    },
    gnss: {
      timeS: Float64Array.from({ length: fixes }, (_, i) => i / 5),
      latRad: place(47.21),
      lonRad: place(-14.63),
      heightM: noise(fixes, 2),
      velocityNed: three(fixes, 3),
      positionSigma: three(fixes, 1),
      velocitySigma: three(fixes, 0.1),
    },
    reference: null,
  };
}
