/** Geodesy against published and independently computed values, and against general-purpose packages. */
import { Geodesic } from 'geographiclib-geodesic';
import proj4 from 'proj4';
import * as wgs from '@/workers/engine/geodesy';
import { createRandom } from '@/workers/engine/random';
import { degToRad, radToDeg } from '@/shared/units';
import data from '../data/geodesy.json';

const out = new Float64Array(3);
const relative = (value: number, expected: number) => Math.abs(value / expected - 1);

describe('WGS-84 constants (NGA.STND.0036, WGS 84, table 3.1 and derived constants)', () => {
  test('E-01…E-03 defining and derived constants', () => {
    expect(wgs.WGS84_A).toBe(6378137);
    expect(1 / wgs.WGS84_F).toBeCloseTo(298.257223563, 12);
    expect(wgs.WGS84_GM).toBe(3.986004418e14);
    expect(wgs.EARTH_RATE).toBe(7.292115e-5);
    expect(Math.abs(wgs.WGS84_B - 6356752.3142)).toBeLessThan(1e-4);
    expect(relative(wgs.WGS84_B, data.constants.b_m)).toBeLessThan(1e-14);
    expect(relative(wgs.WGS84_E2, 6.694379990141e-3)).toBeLessThan(1e-12);
  });

  test('R-01 Earth rate in degrees an hour', () => {
    expect(relative(radToDeg(wgs.EARTH_RATE) * 3600, 15.0410668760655)).toBeLessThan(1e-12);
  });

  test.each(data.radii)('E-12 radii of curvature at $lat_deg°', (row) => {
    const lat = degToRad(row.lat_deg);
    expect(relative(wgs.meridianRadius(lat), row.R_M_m)).toBeLessThan(1e-13);
    expect(relative(wgs.transverseRadius(lat), row.R_N_m)).toBeLessThan(1e-13);
  });

  test('E-13 length of a degree', () => {
    const d = Math.PI / 180;
    expect(Math.abs(wgs.meridianRadius(0) * d - 110574.2758)).toBeLessThan(1e-3);
    expect(Math.abs(wgs.meridianRadius(Math.PI / 4) * d - 111131.7774)).toBeLessThan(1e-3);
    expect(Math.abs(wgs.transverseRadius(Math.PI / 4) * Math.SQRT1_2 * d - 78846.8351)).toBeLessThan(1e-3);
  });
});

describe('geodetic and Earth-centred coordinates', () => {
  test('C-01, C-02 worked example (IOGP Guidance Note 7-2, method 9602)', () => {
    const lat = degToRad(53 + 48 / 60 + 33.82 / 3600);
    const lon = degToRad(2 + 7 / 60 + 46.38 / 3600);
    wgs.geodeticToEcef(lat, lon, 73, out);
    expect(Math.abs(out[0]! - 3771793.968)).toBeLessThan(1e-3);
    expect(Math.abs(out[1]! - 140253.342)).toBeLessThan(1e-3);
    expect(Math.abs(out[2]! - 5124304.349)).toBeLessThan(1e-3);
    wgs.ecefToGeodetic(3771793.968, 140253.342, 5124304.349, out);
    expect(Math.abs(radToDeg(out[0]!) - 53.80939443996)).toBeLessThan(1e-9);
    expect(Math.abs(radToDeg(out[1]!) - 2.12955000132)).toBeLessThan(1e-9);
    expect(Math.abs(out[2]! - 72.999931)).toBeLessThan(1e-4);
  });

  test('C-03 Earth-centred to local level (IOGP Guidance Note 7-2, methods 9836 and 9837)', () => {
    const lat = degToRad(53 + 48 / 60 + 33.82 / 3600);
    const lon = degToRad(2 + 7 / 60 + 46.38 / 3600);
    wgs.nedOffset(degToRad(55), degToRad(5), 200, lat, lon, 73, out);
    expect(Math.abs(out[0]! + 128642.04)).toBeLessThan(1e-3);
    expect(Math.abs(out[1]! + 189013.869)).toBeLessThan(1e-3);
    expect(Math.abs(out[2]! - 4220.171)).toBeLessThan(1e-3);
  });

  test('C-04 worked example (Vallado, Fundamentals of Astrodynamics, example 3-3)', () => {
    wgs.ecefToGeodetic(6524834, 6862875, 6448296, out);
    expect(Math.abs(radToDeg(out[0]!) - 34.3524951508616)).toBeLessThan(1e-11);
    expect(Math.abs(radToDeg(out[1]!) - 46.44641685679)).toBeLessThan(1e-11);
    expect(Math.abs(out[2]! - 5085218.73109163)).toBeLessThan(1e-6);
  });

  test.each(data.toEcef)('C-05 to Earth-centred: $lat_deg°, $lon_deg°, $h_m m', (row) => {
    wgs.geodeticToEcef(degToRad(row.lat_deg), degToRad(row.lon_deg), row.h_m, out);
    const tolerance = row.h_m > 1e7 ? 1e-7 : 2e-8;
    expect(Math.abs(out[0]! - row.X_m)).toBeLessThan(tolerance);
    expect(Math.abs(out[1]! - row.Y_m)).toBeLessThan(tolerance);
    expect(Math.abs(out[2]! - row.Z_m)).toBeLessThan(tolerance);
  });

  test.each(data.fromEcef)('C-06 from Earth-centred: $X_m, $Y_m, $Z_m m', (row) => {
    wgs.ecefToGeodetic(row.X_m, row.Y_m, row.Z_m, out);
    expect(Math.abs(radToDeg(out[0]!) - row.lat_deg)).toBeLessThan(1e-11);
    expect(Math.abs(radToDeg(out[1]!) - row.lon_deg)).toBeLessThan(1e-11);
    expect(Math.abs(out[2]! - row.h_m)).toBeLessThan(1e-7);
  });

  test('C-07 there and back, 5000 seeded points to 89.5° and 100 km', () => {
    const random = createRandom(7);
    let worstAngle = 0;
    let worstHeight = 0;
    for (let i = 0; i < 5000; i += 1) {
      const lat = degToRad(89.5) * (2 * random.uniform() - 1);
      const lon = Math.PI * (2 * random.uniform() - 1);
      const h = -500 + 100_500 * random.uniform();
      wgs.geodeticToEcef(lat, lon, h, out);
      wgs.ecefToGeodetic(out[0]!, out[1]!, out[2]!, out);
      worstAngle = Math.max(worstAngle, Math.abs(out[0]! - lat), Math.abs(out[1]! - lon));
      worstHeight = Math.max(worstHeight, Math.abs(out[2]! - h));
    }
    expect(worstAngle).toBeLessThan(1e-13);
    expect(worstHeight).toBeLessThan(1e-8);
  });

  test('agrees with a general-purpose projection package on seeded points', () => {
    const toEcef = proj4(
      '+proj=longlat +datum=WGS84 +no_defs',
      '+proj=geocent +datum=WGS84 +units=m +no_defs',
    );
    const random = createRandom(8);
    for (let i = 0; i < 200; i += 1) {
      const lat = 170 * (random.uniform() - 0.5);
      const lon = 359 * (random.uniform() - 0.5);
      const h = 9000 * random.uniform();
      const expected = toEcef.forward([lon, lat, h]);
      wgs.geodeticToEcef(degToRad(lat), degToRad(lon), h, out);
      for (let k = 0; k < 3; k += 1) expect(Math.abs(out[k]! - expected[k]!)).toBeLessThan(5e-8);
    }
  });
});

describe('local north–east–down', () => {
  test.each(data.local)('C-08 $point from $origin', (row) => {
    const [lat0, lon0, h0] = row.origin as [number, number, number];
    const [lat, lon, h] = row.point as [number, number, number];
    const at = (v: number) => degToRad(v);
    wgs.nedOffset(at(lat0), at(lon0), h0, at(lat), at(lon), h, out);
    expect(Math.abs(out[0]! - row.N_m)).toBeLessThan(1e-8);
    expect(Math.abs(out[1]! - row.E_m)).toBeLessThan(1e-8);
    expect(Math.abs(out[2]! - row.D_m)).toBeLessThan(1e-8);
    wgs.nedToGeodetic(at(lat0), at(lon0), h0, row.N_m, row.E_m, row.D_m, out);
    expect(Math.abs(out[0]! - at(lat))).toBeLessThan(1e-13);
    expect(Math.abs(wgs.wrapAngle(out[1]! - at(lon)))).toBeLessThan(1e-12);
    expect(Math.abs(out[2]! - h)).toBeLessThan(1e-7);
  });

  test.each([
    [1000, 2000, -300, 48.12628906429006, 11.54352929052789, 845.791419086],
    [-5000, 12000, 100, 48.07222314239201, 11.67768346421742, 458.628754019],
    [0.01, -0.02, 0.005, 48.11730008992633, 11.51666639807469, 545.394999999],
  ])('C-10 offset %d, %d, %d m to geodetic', (n, e, d, lat, lon, h) => {
    wgs.nedToGeodetic(degToRad(48.1173), degToRad(11.516666666666667), 545.4, n, e, d, out);
    expect(Math.abs(radToDeg(out[0]!) - lat)).toBeLessThan(1e-11);
    expect(Math.abs(radToDeg(out[1]!) - lon)).toBeLessThan(1e-11);
    expect(Math.abs(out[2]! - h)).toBeLessThan(1e-7);
  });

  test('chord lengths agree with geodesics of a general-purpose package over short lines', () => {
    const random = createRandom(9);
    for (let i = 0; i < 100; i += 1) {
      const lat = 160 * (random.uniform() - 0.5);
      const lon = 360 * (random.uniform() - 0.5);
      const end = Geodesic.WGS84.Direct(lat, lon, 360 * random.uniform(), 500);
      wgs.nedOffset(degToRad(lat), degToRad(lon), 0, degToRad(end.lat2!), degToRad(end.lon2!), 0, out);
      // The chord of a 500 m arc is shorter by s³/24R² = 1.3e-7 m.
      expect(Math.abs(Math.hypot(out[0]!, out[1]!, out[2]!) - 500)).toBeLessThan(2e-7);
    }
  });
});
