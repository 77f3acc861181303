/** Normal gravity against the published constants and the closed form. */
import { GAMMA_EQUATOR, GAMMA_POLE, normalGravity, normalGravityNorth } from '@/workers/engine/gravity';
import { degToRad } from '@/shared/units';
import geodesy from '../data/geodesy.json';
import gravity from '../data/gravity.json';

test('E-04, E-05 at equator and poles (NGA.STND.0036, WGS 84)', () => {
  expect(Math.abs(GAMMA_EQUATOR - 9.7803253359)).toBeLessThan(1e-10);
  expect(Math.abs(GAMMA_POLE - 9.8321849379)).toBeLessThan(2e-10);
  expect(normalGravity(0, 0)).toBe(GAMMA_EQUATOR);
  expect(Math.abs(normalGravity(Math.PI / 2, 0) / GAMMA_POLE - 1)).toBeLessThan(1e-15);
});

test.each(geodesy.radii)('E-12 on the ellipsoid at $lat_deg° (Somigliana)', (row) => {
  expect(Math.abs(normalGravity(degToRad(row.lat_deg), 0) / row.gamma0_ms2 - 1)).toBeLessThan(1e-12);
});

test.each(gravity.rows)('G-01, G-02 at $lat_deg°, $h_m m (Heiskanen & Moritz 1967 eq. 2-124)', (row) => {
  const value = normalGravity(degToRad(row.lat_deg), row.h_m);
  expect(Math.abs(value / row.fa2_ms2 - 1)).toBeLessThan(1e-12);
  expect(Math.abs(value - row.exact_down_ms2)).toBeLessThan(Math.abs(row.h_m) <= 1000 ? 1.1e-7 : 2e-6);
});

test.each(gravity.rows)('G-03 north component at $lat_deg°, $h_m m', (row) => {
  const value = normalGravityNorth(degToRad(row.lat_deg), row.h_m);
  expect(Math.abs(value - row.exact_north_ms2)).toBeLessThan(Math.abs(row.h_m) <= 1000 ? 5e-9 : 4e-7);
});
