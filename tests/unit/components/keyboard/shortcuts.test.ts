import { ShortcutKeys, takesKeys } from '@/components/keyboard/shortcuts';

const press = (key: string, atMs = 0, more: object = {}) => ({
  key,
  ctrlKey: false,
  metaKey: false,
  altKey: false,
  timeStamp: atMs,
  target: null,
  ...more,
});

function listening() {
  const done: string[] = [];
  const shortcuts = {
    '?': () => done.push('map'),
    r: () => done.push('r'),
    'g r': () => done.push('recordings'),
  };
  const keys = new ShortcutKeys();
  return {
    done,
    type: (...events: ReturnType<typeof press>[]) => events.map((one) => keys.press(one, shortcuts)),
  };
}

test('a key does what it is named for, a pair what the pair is named for', () => {
  const { done, type } = listening();
  type(press('?'), press('g', 100), press('r', 300), press('r', 400));
  expect(done).toEqual(['map', 'recordings', 'r']);
});

test('a pair that is pressed too slowly is two keys', () => {
  const { done, type } = listening();
  type(press('g'), press('r', 5000));
  expect(done).toEqual(['r']);
});

test('keys with Ctrl, ⌘ or Alt are the browser’s', () => {
  const { done, type } = listening();
  expect(type(press('r', 0, { ctrlKey: true }), press('r', 1, { metaKey: true }), press('r', 2, { altKey: true }))).toEqual([
    false, false, false,
  ]); // prettier-ignore
  expect(done).toEqual([]);
});

test('what is typed in a field, or pressed in a dialog or on a slider, stays there', () => {
  const inside = { closest: (selector: string) => (selector.includes('input') ? {} : null) };
  expect(takesKeys(inside)).toBe(true);
  expect(takesKeys({ closest: () => null })).toBe(false);
  expect(takesKeys(null)).toBe(false);
  const { done, type } = listening();
  type(press('?', 0, { target: inside }));
  expect(done).toEqual([]);
});
