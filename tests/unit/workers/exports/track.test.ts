import { trackGeoJson } from '@/workers/exports/track';
import type { RunTables } from '@/workers/recordings/results';

const tablesOf = (points: readonly (readonly [number, number])[]): RunTables => {
  const none = {
    timeS: new Float64Array(),
    innovation: [],
    sigma: [],
    nis: new Float64Array(),
    accepted: new Uint8Array(),
  };
  const innovations = none as unknown as RunTables['position'];
  return {
    solution: {
      time_s: Float64Array.from(points, (_, i) => i),
      lon_deg: Float64Array.from(points, ([lon]) => lon),
      lat_deg: Float64Array.from(points, ([, lat]) => lat),
      height_m: new Float64Array(points.length),
    },
    position: innovations,
    velocity: innovations,
    coasting: {},
    smoothed: null,
    origin: { latDeg: 0, lonDeg: 0, heightM: 0 },
    extentS: [0, points.length - 1],
  };
};
const geometryOf = (points: readonly (readonly [number, number])[]) => {
  const text = [...trackGeoJson(tablesOf(points), { name: 'x', utcOrigin: null })].join('');
  return (JSON.parse(text) as { features: { geometry: unknown }[] }).features[0]!.geometry;
};

test('a track over the 180° meridian is cut there, both ways', () => {
  expect(geometryOf([[179.9, 10], [-179.9, 12], [-179.8, 12], [179.8, 8]])).toEqual({
    type: 'MultiLineString',
    coordinates: [
      [[179.9, 10, 0], [180, 11, 0]],
      [[-180, 11, 0], [-179.9, 12, 0], [-179.8, 12, 0], [-180, 10, 0]],
      [[180, 10, 0], [179.8, 8, 0]],
    ],
  });
}); // prettier-ignore

test('a track elsewhere stays one line', () => {
  expect(geometryOf([[-14.63, 47.2], [-14.62, 47.21]])).toEqual({
    type: 'LineString',
    coordinates: [[-14.63, 47.2, 0], [-14.62, 47.21, 0]],
  });
}); // prettier-ignore
