import { placeLabels } from '@/components/strip/labels';
import { stripGeometry, stripLayout, stripSentence } from '@/components/strip/strip-model';
import { linearScale } from '@/shared/charts/model/scale';
import type { Strip } from '@/shared/contracts/recordings';

const buckets = 100;
const strip: Strip = {
  startS: 0,
  endS: 1000,
  speedMPerS: Array.from({ length: buckets }, (_, i) => (i >= 40 && i < 50 ? null : i === 70 ? 4 : 2)),
  gnssFixes: Array.from({ length: buckets }, (_, i) => (i >= 20 && i < 30 ? 0 : i >= 80 && i < 90 ? 10 : 50)),
  gapsS: [[400, 500]],
  clippedS: [[700, 700.04]],
};
const layout = stripLayout(1000, 60, 0);

describe('stripGeometry', () => {
  const geometry = stripGeometry(strip, layout);

  it('reaches the top of its ground at the highest speed only', () => {
    expect(geometry.topSpeedMPerS).toBe(4);
    expect(geometry.profile).toContain(`L705 ${layout.profileTop}`);
    const half = Math.round((layout.baseY - (layout.baseY - layout.profileTop) / 2) * 10) / 10;
    expect(geometry.profile).toContain(`L105 ${half}`);
  });

  it('draws the noise of a vehicle that stands still near the ground', () => {
    const still = { ...strip, speedMPerS: strip.speedMPerS.map((_, i) => (i % 2 ? 0.05 : 0.01)) };
    const drawn = stripGeometry(still, layout);
    expect(drawn.topSpeedMPerS).toBe(1);
    const heights = [...drawn.profile.matchAll(/L[\d.]+ ([\d.]+)/g)].map(
      (match) => layout.baseY - Number(match[1]),
    );
    expect(heights).toHaveLength(buckets);
    expect(Math.max(...heights)).toBeLessThan(0.1 * (layout.baseY - layout.profileTop));
  });

  it('breaks profile and ground where the IMU has no samples', () => {
    expect(geometry.profile.match(/Z/g)).toHaveLength(2);
    expect(geometry.ground).toBe(`M0 ${layout.baseY}H400M500 ${layout.baseY}H1000`);
    expect(geometry.gaps).toEqual([{ x: 400, width: 100 }]);
  });

  it('ticks fixes, short and apart where they are sparse, none where there are none', () => {
    const at = (path: string) => [...path.matchAll(/M([\d.]+) /g)].map((match) => Number(match[1]));
    expect(at(geometry.fixes).filter((x) => x > 200 && x < 300)).toEqual([]);
    expect(at(geometry.fixes).filter((x) => x > 800 && x < 900)).toEqual([]);
    expect(at(geometry.sparse)).toHaveLength(10);
  });

  it('keeps a clip of 40 ms wide enough to be seen, where it happened', () => {
    const [clip] = geometry.clipped;
    expect(clip!.width).toBe(3);
    expect(clip!.x + clip!.width / 2).toBeCloseTo(700.02, 2);
  });

  it('says in words what is drawn', () => {
    expect(stripSentence(strip, 2)).toBe(
      'Recording strip: 1000 s long, 4100 GNSS fixes, 10 % of it without fixes, 1 IMU gaps, 1 clipped stretches, 2 outage windows.',
    );
  });

  it('draws nothing but does not fail for a recording of one bucket at rest', () => {
    const still: Strip = { ...strip, endS: 10, speedMPerS: [0], gnssFixes: [0], gapsS: [], clippedS: [] };
    expect(stripGeometry(still, layout).fixes).toBe('');
  });
});

describe('placeLabels', () => {
  const windows = [
    { startS: 300, endS: 360 },
    { startS: 365, endS: 375 },
    { startS: 800, endS: 830 },
  ];

  it.each([320, 350, 700, 1300])('never lets two labels touch, %d px wide', (width) => {
    const placed = placeLabels({ x: linearScale([0, 1240], [8, width - 8]), windows, characterPx: 6.2 });
    const spans = placed
      .map((label) => [label.x - label.text.length * 3.1, label.x + label.text.length * 3.1] as const)
      .sort((a, b) => a[0] - b[0]);
    for (let i = 1; i < spans.length; i++)
      expect(spans[i]![0] - spans[i - 1]![1]).toBeGreaterThanOrEqual(7.9);
    expect(spans[0]![0]).toBeGreaterThanOrEqual(0);
    expect(spans[spans.length - 1]![1]).toBeLessThanOrEqual(width);
  });

  it('prefers the selected window, then the longest, then the clock', () => {
    const x = linearScale([0, 1240], [8, 342]);
    const texts = (selected: number | null) =>
      placeLabels({ x, windows, selected, characterPx: 6.2 })
        .filter((label) => label.kind === 'window')
        .map((label) => label.text);
    expect(texts(null)).toEqual(['60 s', '30 s']);
    expect(texts(1)).toEqual(['10 s', '30 s']);
  });
});
