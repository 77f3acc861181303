/** The page of the charts' bench: the product's own charts, fed by the bench. Bundled for the bench alone; no part of the client. */
import { createRoot } from 'react-dom/client';
import { View } from 'react-native';
import { ChartGroup } from '@/components/charts/chart-group';
import type { ChartContent } from '@/shared/charts/model/layers';
import { columnSeries } from '@/shared/charts/model/series';
import { TimeChart } from '@/components/charts/TimeChart';
import { CHANNEL_CHARTS, channelContent, withGaps } from '@/components/recordings/channel-content';
import { ThemeProvider } from '@/components/ui/ThemeProvider';
import { splicedSeries, type Piece } from '@/hooks/finer/splice';
import type { Series } from '@/shared/contracts/recordings';
import { createRandom } from '@/workers/engine/random';
import { painted } from './painted';

const TONES = ['north', 'east', 'down', 'ink'] as const;

/** Set up by `stream` or `look`: one update each. */
let update: (() => void) | null = null;
let shown: ChartGroup | null = null;

/** `charts` charts of `lines` lines of `points` points; each step changes all values. */
async function stream(charts: number, lines: number, points: number): Promise<void> {
  const random = createRandom(7);
  // Two sets taken in turn: making values is no part of drawing them.
  const sets = [0, 1].map(() =>
    Array.from({ length: charts * lines }, () => {
      let value = 0;
      return Float32Array.from({ length: points }, () => (value = 0.98 * value + random.uniform() - 0.5));
    }),
  );
  const time = Float64Array.from({ length: points }, (_, i) => i);
  let at = 0;
  const contents = Array.from({ length: charts }, (_, chart): ChartContent => ({
    id: `chart-${chart}`,
    title: `Chart ${chart + 1}`,
    unit: 'm',
    layers: TONES.slice(0, lines).map((tone, line) => ({
      kind: 'line',
      id: `line-${line}`,
      label: tone,
      tone,
      series: () => columnSeries(time, sets[at]![chart * lines + line]!, points),
    })),
    windows: () => [{ startS: points * 0.4, endS: points * 0.5 }],
    domain: () => [-5, 5],
    sentence: () => '',
  }));
  const group = new ChartGroup([0, points - 1]);
  await mount(group, contents);
  update = () => {
    at = 1 - at;
    group.invalidate();
  };
}

/** A recording's charts with finer pieces in place; each step pans or zooms. */
async function look(
  coarse: Series,
  pieces: Piece<Series>[],
  view: [number, number],
  how: 'pan' | 'zoom',
): Promise<void> {
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
  update = () => {
    step++;
    const outwards = step % 20 < 10;
    if (how === 'pan') group.viewport.pan(((outwards ? 1 : -1) * span) / 40);
    else group.viewport.zoom(outwards ? 0.93 : 1 / 0.93, (view[0] + view[1]) / 2);
  };
}

/** One update, until it is laid out and painted. */
const step = () => painted(update!);
const draws = () => shown!.draws;

const root = createRoot(document.getElementById('root')!);

async function mount(group: ChartGroup, contents: readonly ChartContent[]): Promise<void> {
  shown = group;
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

const chartsBench = { stream, look, step, draws };
Object.assign(globalThis, { chartsBench });
export type ChartsBench = typeof chartsBench;
