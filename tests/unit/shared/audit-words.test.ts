import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { actionWords, AUDIT_ACTIONS } from '@/shared/audit-words';
import { browserWords } from '@/components/team/browser-words';

/** Every action that the server's services write into the trail. */
function written(): string[] {
  const folder = path.resolve('server/services');
  return readdirSync(folder).flatMap((file) => {
    const text = readFileSync(path.join(folder, file), 'utf8');
    const kinds = 'invitation|map-template|member|recording|requirement|set|token|vehicle|version|workspace';
    return [...text.matchAll(new RegExp(`'((?:${kinds})\\.[a-z-]+)'`, 'g'))]
      .map((match) => match[1]!)
      .filter((name) => !name.endsWith('.json'));
  });
}

test('every action that is written has words', () => {
  const actions = [...new Set(written())];
  expect(actions.length).toBeGreaterThan(25);
  expect(actions.filter((action) => !AUDIT_ACTIONS.includes(action))).toEqual([]);
});

test('an action without words is told by its name', () => {
  expect(actionWords('strange-thing.done')).toBe('Strange thing done');
  expect(actionWords('version.released')).toBe('Released');
});

test.each([
  ['Mozilla/5.0 (X11; Linux x86_64; rv:140.0) Gecko/20100101 Firefox/140.0', 'Firefox on Linux'],
  [
    'Mozilla/5.0 (Linux; Android 15) AppleWebKit/537.36 (KHTML, like Gecko) Chrome/142.0.0.0 Mobile Safari/537.36',
    'Chrome on Android',
  ],
  [
    'Mozilla/5.0 (iPhone; CPU iPhone OS 18_0 like Mac OS X) AppleWebKit/605.1.15 Version/18.0 Mobile/15E148 Safari/604.1',
    'Safari on iPhone',
  ],
  ['curl/8.5', 'Browser'],
  [null, 'Unknown browser'],
])('%s is %s', (agent, words) => {
  expect(browserWords(agent)).toBe(words);
});
