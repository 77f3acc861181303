import { screen, within } from '@testing-library/react-native';
import type { ParameterField } from '@/shared/parameters/parameter-field';
import { FIELDS } from '@/shared/parameters/parameter-fields';
import { writePath } from '@/shared/parameters/parameter-path';
import { leafAt, parameterLeaves } from '@/components/bench/parameter-schema';
import { SLIDERS } from '@/shared/parameters/parameter-specs';
import { unitSymbol } from '@/shared/parameters/parameter-words';
import { changeCount, parameterSections } from '@/components/sets/parameter-rows';
import { ParameterTable } from '@/components/sets/ParameterTable';
import { defaultParameters, type Parameters } from '@/shared/contracts/parameters';
import { RAD_PER_DEG } from '@/shared/units';
import { renderAs } from '../render';

const before = defaultParameters();
const after: Parameters = {
  ...before,
  gyro: { ...before.gyro, whiteNoiseRadPerSqrtS: (0.5 * RAD_PER_DEG) / 60 },
  gnss: { ...before.gnss, useVelocity: false },
};
const rowOf = (sections: ReturnType<typeof parameterSections>, path: string) =>
  sections.flatMap((section) => section.rows).find((row) => row.path === path);

test('values stand in their display units', () => {
  const row = rowOf(parameterSections(after, before), 'gyro.whiteNoiseRadPerSqrtS');
  expect(row).toMatchObject({ unit: '°/√h', changed: true });
  expect(row?.value).toBeCloseTo(0.5, 12);
});

test('what differs from the parent is marked and counted', () => {
  const sections = parameterSections(after, before);
  expect(changeCount(sections)).toBe(2);
  expect(rowOf(sections, 'gnss.useVelocity')).toMatchObject({ value: 'off', before: 'on', changed: true });
});

test('a first version has nothing to differ from', () => {
  expect(changeCount(parameterSections(after, null))).toBe(0);
});

/** Dotted paths of all that is set, however deep. */
function pathsOf(value: unknown, prefix = ''): string[] {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) return [prefix];
  return Object.entries(value).flatMap(([key, inner]) => pathsOf(inner, prefix ? `${prefix}.${key}` : key));
}
const named: readonly ParameterField[] = [...SLIDERS, ...FIELDS];

test('every parameter that is set has a row', () => {
  const paths = new Set(parameterSections(before, null).flatMap((s) => s.rows.map((row) => row.path)));
  const set = pathsOf(before);
  expect(set).toContain('aids.zeroVelocity.enabled');
  expect(set.filter((path) => !paths.has(path))).toEqual([]);
});

test('every leaf of the contract, set by default or not, is named once, and nothing else is', () => {
  const leaves = parameterLeaves().map(({ path }) => path);
  expect(leaves).toEqual(expect.arrayContaining(pathsOf(before)));
  expect(named.map(({ path }) => path).sort()).toEqual([...leaves].sort());
});

test('every number has its unit and every choice its words', () => {
  const bare = parameterLeaves().filter((leaf) => {
    const field = named.find(({ path }) => path === leaf.path);
    if (leaf.kind === 'switch') return false;
    if (leaf.kind === 'choice') return leaf.options.some((option) => !field?.words?.[option]);
    return !field || unitSymbol(field) === '';
  });
  expect(bare.map(({ path }) => path)).toEqual([]);
});

test('a group of values counts only while a switch of the contract turns it on', () => {
  const needed = FIELDS.flatMap((field) => field.needs ?? []);
  expect(needed.map((path) => leafAt(path).kind)).toEqual(needed.map(() => 'switch'));
});

test('nested aids stand in the trade’s words and units', () => {
  const aided = writePath(before, 'aids.stopDetection.gyroSpreadRadPerS', 2 * RAD_PER_DEG);
  const sections = parameterSections(writePath(aided, 'aids.zeroVelocity.enabled', true), before);
  expect(rowOf(sections, 'aids.zeroVelocity.enabled')).toMatchObject({ value: 'on', before: 'off' });
  const spread = rowOf(sections, 'aids.stopDetection.gyroSpreadRadPerS');
  expect(spread).toMatchObject({ unit: '°/s', changed: true });
  expect(spread?.value).toBeCloseTo(2, 12);
});

test('the table shows a change with its sign', () => {
  renderAs(<ParameterTable sections={parameterSections(after, before)} parentName="version 1" />);
  const cell = within(screen.getByLabelText('Gyro'));
  expect(cell.getByText(/\+0\.20/)).toBeOnTheScreen();
  expect(screen.getByText('was on')).toBeOnTheScreen();
});
