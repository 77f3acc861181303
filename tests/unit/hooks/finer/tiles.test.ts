import { isHeld, tilesOf } from '@/hooks/finer/tiles';

const WHOLE = [100, 1700] as const;

test('the whole, and more than half of it, needs nothing finer', () => {
  expect(tilesOf([100, 1700], WHOLE)).toEqual([]);
  expect(tilesOf([300, 1200], WHOLE)).toEqual([]);
});

test('a view asks for the one or two tiles of the deepest level that are as long as it', () => {
  expect(tilesOf([150, 900], WHOLE)).toEqual([{ level: 1, index: 0, fromS: 100, toS: 900 }]);
  expect(tilesOf([600, 1000], WHOLE)).toEqual([
    { level: 2, index: 1, fromS: 500, toS: 900 },
    { level: 2, index: 2, fromS: 900, toS: 1300 },
  ]);
});

test('every view lies in its tiles, and these are no more than four times as long', () => {
  for (let level = 1; level < 12; level++)
    for (const share of [0.51, 0.75, 1]) {
      const span = (share * 1600) / 2 ** level;
      for (const at of [0, 0.137, 0.5, 0.93, 1]) {
        const fromS = 100 + at * (1600 - span);
        const tiles = tilesOf([fromS, fromS + span], WHOLE);
        expect(tiles.length).toBeGreaterThanOrEqual(1);
        expect(tiles.length).toBeLessThanOrEqual(2);
        expect(tiles[0]!.fromS).toBeLessThanOrEqual(fromS + 1e-6);
        expect(tiles.at(-1)!.toS).toBeGreaterThanOrEqual(fromS + span - 1e-6);
        expect((tiles.at(-1)!.toS - tiles[0]!.fromS) / span).toBeLessThan(4);
      }
    }
});

test('neighbouring views share their tiles: panning fetches one at a time', () => {
  const first = tilesOf([600, 1000], WHOLE);
  const next = tilesOf([610, 1010], WHOLE);
  expect(next).toEqual(first);
  expect(tilesOf([950, 1350], WHOLE)[0]).toEqual(first[1]);
});

test('the last tile ends where the whole does', () => {
  expect(tilesOf([1690, 1700], WHOLE).at(-1)!.toS).toBe(1700);
});

test('a piece in which nothing was left out serves every tile within it', () => {
  const [tile] = tilesOf([600, 650], WHOLE);
  expect(isHeld(tile!, [[500, 900]])).toBe(true);
  expect(isHeld(tile!, [[620, 900]])).toBe(false);
  expect(isHeld(tile!, [])).toBe(false);
});

test('a view without length asks for nothing', () => {
  expect(tilesOf([5, 5], WHOLE)).toEqual([]);
  expect(tilesOf([0, 1], [3, 3])).toEqual([]);
});
