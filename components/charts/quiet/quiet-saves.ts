/** What the quiet charts save: their figures and their tables. Pure. */
import { columnName, type CsvTable } from '@/shared/charts/figure/csv';
import { plotFigure } from '@/shared/charts/figure/plot-figure';
import type { ChartFigure } from '@/shared/charts/figure/sheet';
import { budgetShapes, sourceShapes, type BudgetColumns } from './budget-shapes';
import { correlationShapes, type CorrelationData } from './correlation-shapes';
import {
  allanPlot,
  driftGrowthPlot,
  histogramPlot,
  type AllanData,
  type DriftGrowthData,
  type HistogramData,
} from '@/shared/charts/plots';

type Words = Pick<ChartFigure, 'title' | 'aside' | 'sentence'>;
/** What SaveControl takes of a chart. */
export interface QuietSave {
  figure: () => ChartFigure;
  tables: () => CsvTable[];
}

export const allanSave = (data: AllanData, words: Words): QuietSave => ({
  figure: () => plotFigure(allanPlot(data), words),
  tables: () => {
    const rows = [
      ...data.curves.flatMap(({ axis, points }) =>
        points.map((at) => [axis, at.tauS, at.deviation, at.low, at.high, at.model]),
      ),
      ...(data.expected ?? []).map((at) => ['datasheet', at.tauS, at.deviation, null, null, null]),
    ];
    const [u, low, high, fit] = ['deviation', 'low', 'high', 'fit'].map((name) =>
      columnName(name, data.unit),
    );
    return [table(['axis', 'tau_s', u!, low!, high!, fit!], rows)];
  },
});

export const histogramSave = (data: HistogramData, words: Words): QuietSave => ({
  figure: () => plotFigure(histogramPlot(data), words),
  tables: () => [
    table(
      ['from_sigma', 'to_sigma', 'density_per_sigma'],
      data.bins.map((bin) => [bin.from, bin.to, bin.density]),
    ),
  ],
});

export const driftGrowthSave = (data: DriftGrowthData, words: Words): QuietSave => ({
  figure: () => plotFigure(driftGrowthPlot(data), words),
  tables: () => [
    table(
      ['window', 'after_s', 'error_m', 'predicted_1sigma_m', 'predicted_95_m'],
      [
        ...data.windows.flatMap((window, i) =>
          window.map(({ afterS, errorM }) => [i + 1, afterS, errorM, null, null]),
        ),
        ...data.predicted.map(({ afterS, sigmaM, p95M }) => ['predicted', afterS, null, sigmaM, p95M]),
      ],
    ),
  ],
});

export const correlationSave = (data: CorrelationData, words: Words): QuietSave => ({
  figure: () => ({
    ...words,
    legend: data.axes.map(({ label, tone }) => ({
      label,
      sample: [{ kind: 'rect', x: 4, y: 0, width: 6, height: 10, fill: tone }],
    })),
    xTitle: 'lag, fixes',
    yTitle: 'autocorrelation',
    aspect: 0.5,
    plot: (box) => correlationShapes(data, box),
  }),
  tables: () => [
    table(
      ['lag_fixes', ...data.axes.map(({ label }) => columnName('correlation', label)), 'band_95'],
      Array.from({ length: data.lags }, (_, i) => [
        i + 1,
        ...data.axes.map(({ values }) => values[i] ?? null),
        data.band,
      ]),
    ),
  ],
});

export const budgetSave = (
  { sources, columns }: BudgetColumns & { sources: readonly string[] },
  words: Words,
): QuietSave => ({
  figure: () => ({
    ...words,
    legend: sources.map((label, rank) => ({ label, sample: sourceShapes(rank, 2, 0, 12, 10) })),
    xTitle: 's without GNSS',
    yTitle: 'share of variance',
    aspect: 0.5,
    plot: (box) => budgetShapes({ columns }, { ...box, top: box.top + 16 }),
  }),
  tables: () => [
    table(
      ['after_s', 'total_1sigma_m', ...sources.map((source) => columnName('share', source))],
      columns.map(({ afterS, totalM, shares }) => [afterS, totalM, ...shares]),
    ),
  ],
});

const table = (names: readonly string[], rows: readonly (number | string | null)[][]): CsvTable => ({
  part: '',
  label: `Figures, CSV (${rows.length} rows)`,
  columns: names.map((name, column) => ({ name, values: rows.map((row) => row[column] ?? null) })),
});
