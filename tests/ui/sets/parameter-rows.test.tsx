import { screen, within } from '@testing-library/react-native';
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

test('every parameter of the contract that is set has a row', () => {
  const paths = new Set(parameterSections(before, null).flatMap((s) => s.rows.map((row) => row.path)));
  const leaves = Object.entries(before).flatMap(([group, fields]) =>
    Object.entries(fields ?? {}).map(([field]) => `${group}.${field}`),
  );
  expect(leaves.filter((path) => !paths.has(path))).toEqual([]);
});

test('the table shows a change with its sign', () => {
  renderAs(<ParameterTable sections={parameterSections(after, before)} parentName="version 1" />);
  const cell = within(screen.getByLabelText('Gyro'));
  expect(cell.getByText(/\+0\.20/)).toBeOnTheScreen();
  expect(screen.getByText('was on')).toBeOnTheScreen();
});
