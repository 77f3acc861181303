/** The figures and parameters of a comparison as rows, one cell an entry. Pure. */
import { headlineFigures, type HeadlineFigure } from '@/components/bench/headline';
import type { Parameters } from '@/shared/contracts/parameters';
import type { RunSummary } from '@/shared/contracts/runs';
import type { DisplayUnits } from '@/shared/display-units';
import { formatChange } from '@/shared/format';
import { FIELD_GROUPS } from '@/shared/parameters/parameter-field';
import { PARAMETER_LIST } from '@/shared/parameters/parameter-list';
import { readPath } from '@/shared/parameters/parameter-path';
import { shownValue, unitSymbol } from '@/shared/parameters/parameter-words';

export interface FigureCell {
  value: number | null;
  digits: number;
  verdict: HeadlineFigure['verdict'];
  /** Against the first entry, with its sign; null: the first itself, or nothing to compare. */
  change: string | null;
  /** What it should be. */
  remark: string;
}

export interface CompareRow {
  key: string;
  label: string;
  unit: string;
  cells: FigureCell[];
}

/** `summaries` in the entries' order; null: not there yet. The first is what the others are compared with. */
export function figureRows(summaries: readonly (RunSummary | null)[]): CompareRow[] {
  const [reference = null] = summaries;
  const columns = summaries.map((summary, i) => headlineFigures(summary, i === 0 ? null : reference));
  const headline = (columns[0] ?? []).map((first, row): CompareRow => {
    const cells = columns.map((column) => column[row]!);
    const named = cells.find(({ value }) => value !== null) ?? first;
    return { key: first.key, label: named.label, unit: named.unit, cells: cells.map(headlineCell) };
  });
  return [...headline, ...SINGLE.flatMap((single) => singleRow(single, summaries))];
}

/** What a figure should be stands with the first; with the others only where they miss it. */
const headlineCell = (
  { value, digits, verdict, change, remark }: HeadlineFigure,
  at: number,
): FigureCell => ({
  value,
  digits,
  verdict,
  change,
  remark: at === 0 || verdict === 'bad' ? remark : '',
});

interface Single {
  key: string;
  label: string;
  unit: string;
  of: (summary: RunSummary) => number | null;
}

/** What one number of a summary says, without bounds. */
const SINGLE: readonly Single[] = [
  {
    key: 'sigma-horizontal',
    label: 'Horizontal σ, mean',
    unit: 'm',
    of: ({ meanSigma }) => Math.hypot(meanSigma.positionM[0], meanSigma.positionM[1]),
  },
  { key: 'sigma-yaw', label: 'Yaw σ, mean', unit: '°', of: ({ meanSigma }) => meanSigma.attitudeDeg[2] },
  {
    key: 'truth-horizontal',
    label: 'Horizontal error, RMS against truth',
    unit: 'm',
    of: ({ truth }) => truth?.horizontalRmseM ?? null,
  },
  {
    key: 'truth-yaw',
    label: 'Yaw error, RMS against truth',
    unit: '°',
    of: ({ truth }) => truth?.attitudeRmseDeg?.yaw ?? null,
  },
  {
    key: 'nees',
    label: 'NEES position, mean',
    unit: 'of 3',
    of: ({ truth }) => truth?.aneesPosition ?? null,
  },
];

/** Nothing where no entry has it. */
function singleRow(
  { key, label, unit, of }: Single,
  summaries: readonly (RunSummary | null)[],
): CompareRow[] {
  const values = summaries.map((summary) => summary && of(summary));
  if (values.every((value) => value === null)) return [];
  const [reference] = values;
  const cells = values.map((value, i): FigureCell => {
    const compared = i > 0 && value !== null && reference !== null && reference !== undefined;
    return {
      value,
      digits: 3,
      verdict: 'plain',
      change: !compared ? null : value === reference ? '±0' : formatChange(value - reference, 3),
      remark: '',
    };
  });
  return [{ key, label, unit, cells }];
}

export interface ParameterRow {
  path: string;
  /** "Gyro, white noise (ARW)". */
  label: string;
  unit: string;
  cells: (number | string | null)[];
}

/** Parameters in which the entries differ, in the order of the bench. */
export function differingParameters(
  entries: readonly (Parameters | null)[],
  chosen: DisplayUnits = {},
): ParameterRow[] {
  const known = entries.filter((one) => one !== null);
  return PARAMETER_LIST.flatMap((field) => {
    const values = new Set(known.map((one) => JSON.stringify(readPath(one, field.path))));
    if (values.size < 2) return [];
    return [
      {
        path: field.path,
        label: `${FIELD_GROUPS[field.group]}: ${field.label}`,
        unit: unitSymbol(field, chosen),
        cells: entries.map((one) => one && shownValue(field, readPath(one, field.path), chosen)),
      },
    ];
  });
}
