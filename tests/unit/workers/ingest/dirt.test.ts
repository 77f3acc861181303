/** Logs with dirt thrown at them, seeded: the intake decodes, asks or refuses with reasons, and never falls over. */
import fc from 'fast-check';
import { gzipSync } from 'node:zlib';
import { cleanLogs, decodeLogs, testStore, type TestStore } from '../support';

jest.setTimeout(120_000);

let at: TestStore;
beforeAll(() => {
  at = testStore();
});
afterAll(() => at.remove());

const CLEAN = cleanLogs();
const NMEA = ['$GNGGA,100000.00,4712.6000,N,01437.8000,W,4,12,0.8,40,M,54.7,M,,*', '$GNRMC,100000.00,A,4712.6000,N,01437.8000,W,1.2,30,010326,,,A*'].join('\n'); // prettier-ignore
const GPX = '<gpx version="1.1"><trk><trkseg><trkpt lat="47.21" lon="-14.63"><ele>4</ele><time>2026-03-01T10:00:00Z</time></trkpt></trkseg></trk></gpx>'; // prettier-ignore
const SEEDS: [string, Buffer][] = [
  ['CSV', Buffer.from(CLEAN.gnss)],
  ['NMEA', Buffer.from(`${NMEA}\n`.repeat(20))],
  ['GPX', Buffer.from(GPX.replace(/<trkpt.*<\/trkpt>/, (point) => point.repeat(20)))],
  ['gzip', gzipSync(CLEAN.gnss)],
];

interface Stain {
  at: number;
  length: number;
  bytes: Uint8Array;
}
const stains = fc.array(
  fc.record<Stain>({
    at: fc.double({ min: 0, max: 1, noNaN: true }),
    length: fc.integer({ min: 0, max: 40 }),
    bytes: fc.oneof(
      fc.uint8Array({ maxLength: 12 }),
      fc.constantFrom(',', '"', ';', '\n', '\r', '\t', '<', '</trkpt>', '$GP', '1e999', '-', '#').map((text) => Buffer.from(text)),
    ),
  }),
  { minLength: 1, maxLength: 6 },
); // prettier-ignore

function stained(clean: Buffer, dirt: readonly Stain[]): Buffer {
  return dirt.reduce((bytes, { at: share, length, bytes: put }) => {
    const from = Math.floor(share * bytes.length);
    return Buffer.concat([bytes.subarray(0, from), put, bytes.subarray(from + length)]);
  }, clean);
}

describe.each(SEEDS)('%s', (_, clean) => {
  it.each(['gnss', 'imu'] as const)('as %s file', async (role) => {
    await fc.assert(
      fc.asyncProperty(stains, async (dirt) => {
        const result = await decodeLogs(at.store, { ...CLEAN, [role]: stained(clean, dirt) });
        if (result.outcome === 'ready') return expect(result.endS).toBeGreaterThan(result.startS);
        expect(result.problems.length).toBeGreaterThan(0);
        for (const problem of result.problems) {
          expect(problem.message).toMatch(/\.$/);
          expect(problem.remedy.length).toBeGreaterThan(20);
        }
        expect(await at.store.list('recordings/rec/imu')).toEqual([]);
      }),
      { seed: 20_260_301, numRuns: 25 },
    );
  });
});
