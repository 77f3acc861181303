import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { ConfigError, loadConfig } from '@/server/config';
import { VERSION } from '@/server/version';

describe('the configuration', () => {
  const dataDir = fs.mkdtempSync(path.join(os.tmpdir(), 'driftwright-config-'));
  afterAll(() => fs.rmSync(dataDir, { recursive: true }));
  const base = { DATABASE_URL: 'postgres://localhost/x', DATA_DIR: dataDir };

  it('has a default for everything but the database', () => {
    expect(loadConfig(base)).toMatchObject({
      port: 4600,
      host: '127.0.0.1',
      workers: 2,
      demo: true,
      smtpUrl: null,
      publicUrl: null,
    });
  });

  it('takes an empty variable for one that is not set', () => {
    expect(loadConfig({ ...base, PORT: '', SMTP_URL: '' })).toMatchObject({ port: 4600, smtpUrl: null });
  });

  it('names every fault in one line', () => {
    const load = () => loadConfig({ DATA_DIR: dataDir, PORT: '99999', DEMO: 'yes', PUBLIC_URL: 'drift' });
    expect(load).toThrow(ConfigError);
    expect(load).toThrow(/^The configuration is not usable: .*PORT.*DATABASE_URL.*PUBLIC_URL.*DEMO.*\.$/);
  });

  it('keeps files below the data folder, or in object storage where STORE_URL names some', () => {
    expect(loadConfig(base).store).toEqual({ kind: 'folder', root: path.join(dataDir, 'store') });
    const keys = { AWS_ACCESS_KEY_ID: 'id', AWS_SECRET_ACCESS_KEY: 'secret' };
    const env = { ...base, ...keys, STORE_URL: 's3://breakwater/lab/one/', AWS_REGION: 'north-1' };
    expect(loadConfig(env).store).toEqual({
      kind: 's3', bucket: 'breakwater', prefix: 'lab/one', region: 'north-1', endpoint: null,
      credentials: { accessKeyId: 'id', secretAccessKey: 'secret' },
    }); // prettier-ignore
    const bare = { ...base, STORE_URL: 's3://breakwater', AWS_ENDPOINT_URL: 'http://127.0.0.1:9000' };
    expect(loadConfig(bare).store).toMatchObject({
      prefix: '',
      endpoint: bare.AWS_ENDPOINT_URL,
      credentials: null,
    });
    for (const STORE_URL of ['file:///x', 's3://', 's3://x/../y', 's3://Big'])
      expect(() => loadConfig({ ...base, STORE_URL })).toThrow(
        'STORE_URL must be s3://bucket or s3://bucket/prefix',
      );
  });

  it('cuts the slash off the public address, so that links have one', () => {
    expect(loadConfig({ ...base, PUBLIC_URL: 'https://drift.example/' }).publicUrl).toBe(
      'https://drift.example',
    );
  });
});

it('the version is the package’s', () => {
  const file = fs.readFileSync(path.join(__dirname, '../../../package.json'), 'utf8');
  expect(VERSION).toBe((JSON.parse(file) as { version: string }).version);
});
