import { differingParameters, figureRows } from '@/components/compare/compare-rows';
import { defaultParameters } from '@/shared/contracts/parameters';
import { driftPoint, makeSummary, outage } from '../bench/summary';

const withDrift = (metres: number) => makeSummary({ outages: [outage(100, [driftPoint(60, metres, 10)])] });

describe('figures', () => {
  it('stand in the entries’ order, each with its change against the first', () => {
    const rows = figureRows([withDrift(12), withDrift(9), null]);
    const drift = rows.find(({ key }) => key === 'drift')!;
    expect(drift).toMatchObject({ label: 'Drift after 60 s', unit: 'm' });
    expect(drift.cells.map(({ value }) => value)).toEqual([12, 9, null]);
    expect(drift.cells[0]!.change).toBeNull();
    expect(drift.cells[1]!.change).toBe('−3.00 m');
    expect(drift.cells[2]!.change).toBeNull();
  });

  it('leave out what no entry has: errors against a truth that is not there', () => {
    const keys = figureRows([withDrift(12), withDrift(9)]).map(({ key }) => key);
    expect(keys).toContain('sigma-horizontal');
    expect(keys).not.toContain('truth-horizontal');
  });

  it('of one entry that is still being computed are there, without values', () => {
    const rows = figureRows([null]);
    expect(rows.length).toBeGreaterThan(4);
    expect(rows.every(({ cells }) => cells.length === 1 && cells[0]!.value === null)).toBe(true);
  });
});

describe('parameters', () => {
  it('are told only where the entries differ, in the person’s unit', () => {
    const one = defaultParameters();
    const two = { ...one, gnss: { ...one.gnss, positionScale: one.gnss.positionScale * 2 } };
    const rows = differingParameters([one, two, one]);
    expect(rows).toHaveLength(1);
    expect(rows[0]!.path).toBe('gnss.positionScale');
    expect(rows[0]!.cells[1]).toBe((rows[0]!.cells[0] as number) * 2);
    expect(rows[0]!.cells[2]).toBe(rows[0]!.cells[0]);
    expect(differingParameters([one, one])).toEqual([]);
  });

  it('of an entry that is not loaded are blank', () => {
    const one = defaultParameters();
    const two = { ...one, gnss: { ...one.gnss, positionScale: 3 } };
    expect(differingParameters([one, null, two])[0]!.cells[1]).toBeNull();
  });
});
