import { isProblem, planSchedule, planWords, type Schedule } from '@/components/strip/schedule';
import { outagesSchema, type Outage } from '@/shared/contracts/runs';

const limits = { startS: 0.4, endS: 1200.2 };
const at = (startS: number, endS: number): Outage => ({ startS, endS, withhold: 'gnss' });
const plan = (changes: Partial<Schedule> = {}, windows: Outage[] = []) =>
  planSchedule(
    { everyS: 300, lengthS: 60, fromS: 100, toS: 1200, withhold: 'position', adds: false, ...changes },
    windows,
    limits,
  );
const planned = (...given: Parameters<typeof plan>) => {
  const found = plan(...given);
  if (isProblem(found)) throw new Error(found.message);
  return found;
};

describe('a schedule', () => {
  it('draws every N s for T s, each window whole within its stretch', () => {
    const { windows, made } = planned();
    expect(windows.map(({ startS, endS }) => [startS, endS])).toEqual([
      [100, 160],
      [400, 460],
      [700, 760],
      [1000, 1060],
    ]);
    expect(windows.every(({ withhold }) => withhold === 'position')).toBe(true);
    expect(made).toBe(4);
    expect(planned({ toS: 1059.9 }).made).toBe(3);
    expect(planned({ toS: 1060 }).made).toBe(4);
  });

  it('may have its windows end where the next begins: the contract takes them', () => {
    const { windows } = planned({ everyS: 60, lengthS: 60, fromS: 0.4, toS: 1200.2 });
    expect(windows).toHaveLength(19);
    expect(outagesSchema.safeParse(windows).success).toBe(true);
  });

  it('replaces what is there, or adds what is not in the way of it and says what it left out', () => {
    const there = [at(450, 470), at(160, 170)];
    expect(planned({}, there).windows).toHaveLength(4);
    const added = planned({ adds: true }, there);
    expect(added.windows.map(({ startS }) => startS)).toEqual([100, 160, 450, 700, 1000]);
    expect(added).toMatchObject({ made: 3, leftOut: 1 });
    expect(planWords(added)).toBe(
      '3 windows will be drawn. One more is left out: a window that stays is in the way.',
    );
    expect(outagesSchema.safeParse(added.windows).success).toBe(true);
  });

  it('keeps milliseconds through many steps', () => {
    const { windows } = planned({ everyS: 7.3, lengthS: 2.1, fromS: 0.4, toS: 1000 });
    expect(windows.at(-1)!.startS).toBe(Number((0.4 + 7.3 * (windows.length - 1)).toFixed(3)));
    expect(outagesSchema.safeParse(windows).success).toBe(true);
  });

  it.each<[Partial<Schedule>, string, RegExp]>([
    [{ lengthS: 0.5 }, 'lengthS', /at least 1 s/],
    [{ lengthS: NaN }, 'lengthS', /at least 1 s/],
    [{ everyS: 59 }, 'everyS', /60\.0000 s: windows must not overlap/],
    [{ fromS: 0 }, 'fromS', /recording lies there/],
    [{ fromS: 1150 }, 'fromS', /recording lies there/],
    [{ toS: 1300 }, 'toS', /end of the recording/],
    [{ toS: 150 }, 'toS', /so that one window fits/],
    [{ everyS: 2, lengthS: 1 }, 'everyS', /550 windows, a run takes 200/],
  ])('of %j says what is wrong at its field', (changes, field, message) => {
    const found = plan(changes);
    expect(found).toMatchObject({ field, message: expect.stringMatching(message) as string });
  });

  it('counts the windows that stay', () => {
    const there = Array.from({ length: 190 }, (_, i) => at(1 + i, 2 + i));
    const found = plan({ adds: true, everyS: 20, lengthS: 5, fromS: 400 }, there);
    expect(found).toMatchObject({
      field: 'everyS',
      message: expect.stringContaining('230 windows') as string,
    });
  });
});
