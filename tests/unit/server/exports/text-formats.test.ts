import Papa from 'papaparse';
import { parse } from 'yaml';
import { asCsv } from '@/server/exports/as-csv';
import { asYaml } from '@/server/exports/as-yaml';
import { csvCell } from '@/server/exports/csv-cell';
import { FORMATS } from '@/server/exports/formats';
import { exportDocumentSchema } from '@/shared/contracts/exports';
import { sha256OfJson } from '@/workers';
import { buildDocument } from '../../../support/export-document';

const odd = {
  gyro: { whiteNoiseRadPerSqrtS: 1e-7, biasInstabilityRadPerS: 1 / 3 },
  initial: { velocityNedMPerS: [-1, 0, 2.5] as [number, number, number], headingDeg: -90 },
};

describe('JSON and YAML', () => {
  it('read back equal, and the checksum with them', () => {
    const document = buildDocument(odd, { notice: 'on: "yes" # 1e-7\nand -' });
    for (const format of ['json', 'yaml'] as const) {
      const text = FORMATS[format].write(document);
      const back = exportDocumentSchema.parse(format === 'json' ? JSON.parse(text) : parse(text));
      expect(back).toEqual(document);
      expect(sha256OfJson(back.parameters)).toBe(document.checksum.value);
    }
  });

  it('read the same by YAML 1.1: no bare on or off, no exponent without a point', () => {
    const text = asYaml(buildDocument(odd));
    expect(text).toContain('whiteNoiseRadPerSqrtS: 1.0e-7');
    expect(text).toContain('value: "on"');
    expect(text).not.toMatch(/: (on|off|yes|no|\d+e-?\d+)$/m);
    expect(parse(text, { version: '1.1' })).toEqual(buildDocument(odd));
  });

  it('begin with whether the version may be used', () => {
    expect(asYaml(buildDocument()).split('\n')[0]).toBe(
      '# NOT RELEASED: this version is a draft. Not for use on a vehicle.',
    );
  });
});

describe('CSV', () => {
  it('holds every value with its units', () => {
    const document = buildDocument(odd);
    const { data, errors } = Papa.parse<Record<string, string>>(asCsv(document), {
      header: true,
      skipEmptyLines: true,
    });
    expect(errors).toEqual([]);
    const rows = data.filter(({ kind }) => kind === 'parameter');
    expect(rows).toHaveLength(document.values.length);
    expect(rows.find(({ key }) => key === 'gyro.whiteNoiseRadPerSqrtS')).toMatchObject({
      name: 'Gyro: White noise (ARW)',
      value: '1e-7',
      unit: 'rad/√s',
      shown_unit: '°/√h',
    });
    for (const { key, value } of rows) {
      const own = document.values.find(({ path }) => path === key)!.value;
      if (typeof own === 'number') expect(Number(value)).toBe(own);
      if (Array.isArray(own)) expect(value!.split(' ').map(Number)).toEqual(own);
    }
    expect(data[0]).toMatchObject({ kind: 'about', name: 'notice', value: document.notice });
  });

  it.each(['=1+1', '+1', '-cmd', '@SUM(A1)', '\tx', '\r=x', '＝1', '-1+2'])(
    'leaves no formula in %j',
    (text) => {
      const name = csvCell(text).replace(/^"/, '');
      expect(name.startsWith("'")).toBe(true);
    },
  );

  it('leaves numbers as they are and quotes what must be', () => {
    expect([csvCell(-1.5), csvCell([-1, 0, 2.5]), csvCell('a,"b"\nc'), csvCell('plain')]).toEqual([
      '-1.5',
      '-1 0 2.5',
      '"a,""b""\nc"',
      'plain',
    ]);
  });

  it('is safe with a set that is named like a formula', () => {
    const document = buildDocument({}, { set: { id: buildDocument().set.id, name: '=HYPERLINK("x")' } });
    expect(asCsv(document)).toContain(`about,,set,"'=HYPERLINK(""x"")",,,`);
  });
});
