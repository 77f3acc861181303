import fs from 'node:fs';
import path from 'node:path';
import { type Api, startApi } from '../support/api';

describe('the built client', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
    const write = (file: string, text: string) => {
      const target = path.join(api.ctx.config.clientDir, file);
      fs.mkdirSync(path.dirname(target), { recursive: true });
      fs.writeFileSync(target, text);
    };
    write('index.html', '<!doctype html><title>Driftwright</title>');
    write('_expo/static/js/web/entry-0a1b.js', 'export {};');
    write('favicon.png', 'x');
  });
  afterAll(() => api.stop());

  const get = (route: string, init: RequestInit = {}) => fetch(api.url + route, init);

  it.each(['/', '/recordings', '/bench/7a2d9b0e', '/invitation?token=a.b'])(
    'answers %s with the page',
    async (route) => {
      const answer = await get(route);
      expect(answer.status).toBe(200);
      expect(await answer.text()).toContain('<title>Driftwright</title>');
      expect(answer.headers.get('Cache-Control')).toBe('no-cache');
    },
  );

  it('lets hashed files be kept for good, others not', async () => {
    const hashed = await get('/_expo/static/js/web/entry-0a1b.js');
    expect(hashed.headers.get('Cache-Control')).toContain('immutable');
    expect(hashed.headers.get('Content-Type')).toContain('javascript');
    expect((await get('/favicon.png')).headers.get('Cache-Control')).toBe('no-cache');
  });

  it.each(['/_expo/static/js/web/gone-1c2d.js', '/nothing.png', '/..%2f..%2fetc%2fpasswd.txt'])(
    'answers %s, which is not there, with 404',
    async (route) => {
      expect((await get(route)).status).toBe(404);
    },
  );

  it('allows scripts from here alone, and no frame around it', async () => {
    const policy = (await get('/')).headers.get('Content-Security-Policy') ?? '';
    expect(policy).toContain("script-src 'self'");
    expect(policy).toContain("frame-ancestors 'none'");
    expect(policy).not.toContain('upgrade-insecure-requests');
  });

  it('takes nothing but GET', async () => {
    expect((await get('/recordings', { method: 'POST' })).status).toBe(404);
  });
});
