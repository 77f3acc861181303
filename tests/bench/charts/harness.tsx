/** The page of the charts' bench: the product's own charts, fed by the bench. Bundled for the bench alone; no part of the client. */
import { createRoot } from 'react-dom/client';
import { View } from 'react-native';
import { ChartGroup } from '@/components/charts/chart-group';
import type { ChartContent } from '@/components/charts/model/layers';
import { columnSeries } from '@/components/charts/model/series';
import { TimeChart } from '@/components/charts/TimeChart';
import { CHANNEL_CHARTS, channelContent, withGaps } from '@/components/recordings/channel-content';
import { ThemeProvider } from '@/components/ui/ThemeProvider';
import { splicedSeries, type Piece } from '@/hooks/finer/splice';
import type { Series } from '@/shared/contracts/recordings';
import { createRandom } from '@/workers/engine/random';
import { measured, onLongTask, type UpdateTimes } from './page-timing';

const TONES = ['north', 'east', 'down', 'ink'] as const;

export interface StreamingResult extends UpdateTimes {
  updates: number;
  draws: number;
}

/** `charts` charts of `lines` lines of `points` points; all values change `rateHz` times a second. */
async function stream(charts: number, lines: number, points: number, rateHz: number, updates: number) {
  const random = createRandom(7);
  const columns = Array.from({ length: charts * lines }, () => new Float32Array(points));
  const time = Float64Array.from({ length: points }, (_, i) => i);
  const refill = () => {
    for (const column of columns) {
      let value = 0;
      for (let i = 0; i < points; i++) column[i] = value = 0.98 * value + random.uniform() - 0.5;
    }
  };
  refill();
  const contents = Array.from({ length: charts }, (_, chart): ChartContent => ({
    id: `chart-${chart}`,
    title: `Chart ${chart + 1}`,
    unit: 'm',
    layers: TONES.slice(0, lines).map((tone, line) => ({
      kind: 'line',
      id: `line-${line}`,
      label: tone,
      tone,
      series: () => columnSeries(time, columns[chart * lines + line]!, points),
    })),
    windows: () => [{ startS: points * 0.4, endS: points * 0.5 }],
    domain: () => [-5, 5],
    sentence: () => '',
  }));
  const group = new ChartGroup([0, points - 1]);
  await mount(group, contents);
  const before = group.draws;
  const times = await measured(updates, 1000 / rateHz, () => {
    refill();
    group.invalidate();
  });
  return { ...times, updates, draws: group.draws - before } satisfies StreamingResult;
}

/** A recording's charts with finer pieces in place; `steps` of a pan or of a zoom. */
async function look(coarse: Series, pieces: Piece<Series>[], view: [number, number], how: 'pan' | 'zoom') {
  const spliced = splicedSeries(
    withGaps(coarse),
    pieces.map((piece) => ({ ...piece, data: withGaps(piece.data) })),
  );
  const { timeS } = spliced.channels[0]!;
  const group = new ChartGroup([timeS[0]!, timeS[timeS.length - 1]!]);
  await mount(
    group,
    CHANNEL_CHARTS.map((chart) => channelContent(chart, spliced)),
  );
  group.viewport.show(view);
  await frame();
  const span = view[1] - view[0];
  let step = 0;
  return measured(60, 50, () => {
    step++;
    const outwards = step % 20 < 10;
    if (how === 'pan') group.viewport.pan(((outwards ? 1 : -1) * span) / 40);
    else group.viewport.zoom(outwards ? 0.93 : 1 / 0.93, (view[0] + view[1]) / 2);
  });
}

const root = createRoot(document.getElementById('root')!);

async function mount(group: ChartGroup, contents: readonly ChartContent[]): Promise<void> {
  root.render(
    <ThemeProvider>
      <View style={{ width: '100%' }}>
        {contents.map((content) => (
          <TimeChart key={content.id} content={content} group={group} height={150} timeAxis />
        ))}
      </View>
    </ThemeProvider>,
  );
  // Laid out, measured, drawn once.
  for (let i = 0; i < 10; i++) await frame();
}

const frame = () => new Promise((resolve) => requestAnimationFrame(resolve));

Object.assign(globalThis, { chartsBench: { stream, look, onLongTask } });
export interface ChartsBench {
  stream: typeof stream;
  look: typeof look;
}
