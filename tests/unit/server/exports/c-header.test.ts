import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { asCHeader, identifier, literal } from '@/server/exports/c-header';
import type { ExportDocument } from '@/shared/contracts/exports';
import { createRandom } from '@/workers/engine/random';
import { compileAndRun, needGcc } from '../../../support/c-compiler';
import { buildDocument } from '../../../support/export-document';

jest.setTimeout(120_000);

const bitsOf = (value: number) =>
  Buffer.from(new Float64Array([value]).buffer)
    .readBigUInt64LE()
    .toString(16);

describe('the C header', () => {
  let folder: string;
  beforeAll(() => {
    needGcc();
    folder = fs.mkdtempSync(path.join(os.tmpdir(), 'driftwright-c-'));
  });
  afterAll(() => fs.rmSync(folder, { recursive: true, force: true }));

  /** Includes the header in two units' worth of guards and prints every constant: doubles as their bits. */
  const printed = (document: ExportDocument): Map<string, string> => {
    fs.writeFileSync(path.join(folder, 'set.h'), asCHeader(document));
    const lines = document.values.map(({ path: at, value }) => {
      const id = `nav_${identifier(at)}`;
      if (typeof value === 'number') return `bits("${at}", &${id}, 1);`;
      if (Array.isArray(value)) return `bits("${at}", ${id}, ${value.length});`;
      return typeof value === 'boolean' ? `printf("${at} %d\\n", ${id});` : `printf("${at} %s\\n", ${id});`;
    });
    const source = `
      #include <stdint.h>
      #include <inttypes.h>
      #include <stdio.h>
      #include <string.h>
      #include "set.h"
      #include "set.h"
      static void bits(const char *path, const double *values, int count) {
        printf("%s", path);
        for (int i = 0; i < count; i += 1) {
          uint64_t word;
          memcpy(&word, &values[i], sizeof word);
          printf(" %" PRIx64, word);
        }
        printf("\\n");
      }
      int main(void) {
        ${lines.join('\n        ')}
        printf("checksum %s\\nversion %d\\nreleased %d\\nname %s\\n",
          nav_set_checksum_sha256, nav_set_version, NAV_PARAMETERS_RELEASED, nav_set_name);
        return 0;
      }`;
    const main = path.join(folder, 'main.c');
    fs.writeFileSync(main, source);
    const out = compileAndRun(main, path.join(folder, 'main'));
    return new Map(out.trim().split('\n').map((line) => [line.split(' ')[0]!, line.slice(line.indexOf(' ') + 1)])); // prettier-ignore
  };
  const expectSame = (document: ExportDocument, out: Map<string, string>) => {
    for (const { path: at, value } of document.values) {
      const expected =
        typeof value === 'number'
          ? bitsOf(value)
          : typeof value === 'boolean'
            ? value ? '1' : '0'
            : Array.isArray(value) ? value.map(bitsOf).join(' ') : value; // prettier-ignore
      expect([at, out.get(at)]).toEqual([at, expected]);
    }
  };

  it('compiles as strict C99 without a warning and holds the defaults to the last bit', () => {
    const document = buildDocument({ leverArmM: [1.2, -0.1, -0.6] });
    const out = printed(document);
    expect(document.values.length).toBeGreaterThan(60);
    expectSame(document, out);
    expect(out.get('checksum')).toBe(document.checksum.value);
    expect(out.get('version')).toBe('3');
    expect(out.get('released')).toBe('0');
  });

  it('holds any number to the last bit', () => {
    const random = createRandom(5);
    const between = (low: number, high: number) => low * (high / low) ** random.uniform();
    const document = buildDocument({
      gyro: {
        whiteNoiseRadPerSqrtS: between(1e-9, 1),
        biasInstabilityRadPerS: between(1e-10, 1),
        turnOnBiasSigmaRadPerS: 1 / 3,
        biasRandomWalkRadPerSPerSqrtS: 1e-12,
      },
      accel: { whiteNoiseMPerSPerSqrtS: between(1e-8, 10), biasCorrelationTimeS: 1e6 },
      gnss: { latencyS: -0.1, positionFloorM: 0 },
      initial: {
        position: { latDeg: 47.210000000000001, lonDeg: -14.63, heightM: -0 },
        gyroBiasRadPerS: [between(1e-9, 1e-3), -between(1e-9, 1e-3), 5e-324],
      },
    });
    expectSame(document, printed(document));
  });

  it('is not led astray by what people write', () => {
    const name = 'Harbour */ "set" ??/ \\ %s é\u0007';
    const note = 'Ends here */ #error no\nand /* begins ??/';
    const document = buildDocument({}, { set: { id: buildDocument().set.id, name } });
    const out = printed({ ...document, version: { ...document.version, note } });
    expect(out.get('name')).toBe(name);
  });

  it('says at its head whether it may be used, from which data, and with which cautions', () => {
    const text = asCHeader(buildDocument());
    expect(text.split('\n').slice(0, 2)).toEqual([
      '/*',
      ' * NOT RELEASED: this version is a draft. Not for use on a vehicle.',
    ]);
    expect(text).toContain(` * recording: Breakwater loop, SHA-256 ${'ab'.repeat(32)}`);
    expect(text).toContain(' * Keep an independent means of navigation.');
    expect(text).toContain('#ifndef NAV_PARAMETERS_HARBOUR_SET_V3_H');
    expect(text).toContain(
      '/* Gyro: White noise (ARW), rad/√s (0.299084 °/√h) */\n' +
        'static const double nav_gyro_white_noise_rad_per_sqrt_s = 0.000087;',
    );
    expect(text).toContain('static const char nav_gyro_bias_model[] = "turn-on-plus-wander";');
  });

  it.each([
    ['gnss.velocitySigmaHorizontalMPerS', 'gnss_velocity_sigma_horizontal_m_per_s'],
    ['accel.whiteNoiseMPerSPerSqrtS', 'accel_white_noise_m_per_s_per_sqrt_s'],
    ['accel.biasInstabilityMPerS2', 'accel_bias_instability_m_per_s2'],
    ['Über ° set', 'u_ber_set'],
  ])('names %s %s', (name, expected) => {
    expect(identifier(name)).toBe(expected);
  });

  it('writes whole numbers as doubles', () => {
    expect([1, 300, -0, 1e21, 1e-7, 0.5].map(literal)).toEqual([
      '1.0',
      '300.0',
      '-0.0',
      '1e+21',
      '1e-7',
      '0.5',
    ]);
  });
});
