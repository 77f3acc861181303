import {
  drawOutage,
  drawWindow,
  moveWindow,
  parseClock,
  placeWindow,
  resizeWindow,
  windowProblem,
} from '@/components/strip/window-model';
import { outagesSchema, type Outage } from '@/shared/contracts/runs';

const limits = { startS: 0.4, endS: 1000.2 };
const at = (startS: number, endS: number): Outage => ({ startS, endS, withhold: 'gnss' });
/** What drawing answers: a stretch of time, whatever it will stand for. */
const span = (startS: number, endS: number) => ({ startS, endS });
const windows = [at(100, 160), at(300, 330), at(900, 960)];

describe('drawing', () => {
  it('snaps to whole seconds in either direction', () => {
    expect(drawWindow(windows, limits, 200.3, 240.7)).toEqual(span(200, 241));
    expect(drawWindow(windows, limits, 240.7, 200.3)).toEqual(span(200, 241));
  });

  it('stops at the neighbours and at the ends of the recording', () => {
    expect(drawWindow(windows, limits, 200, 500)).toEqual(span(200, 300));
    expect(drawWindow(windows, limits, 980, 2000)).toEqual(span(980, 1000.2));
    expect(drawWindow(windows, limits, 50, -50)).toEqual(span(0.4, 50));
  });

  it('is at least a second long, even of a mere click', () => {
    expect(drawWindow(windows, limits, 200, 200)).toEqual(span(200, 201));
    expect(drawWindow(windows, limits, 1000, 1000)).toEqual(span(999.2, 1000.2));
  });

  it('does not begin inside another window', () => expect(drawWindow(windows, limits, 120, 400)).toBeNull());
});

describe('moving', () => {
  it('keeps the length and stops at neighbours', () => {
    expect(moveWindow(windows, limits, 1, 400.4)[1]).toEqual(at(400, 430));
    expect(moveWindow(windows, limits, 1, 20)[1]).toEqual(at(160, 190));
    expect(moveWindow(windows, limits, 1, 5000)[1]).toEqual(at(870, 900));
    expect(moveWindow(windows, limits, 2, 5000)[2]).toEqual(at(940.2, 1000.2));
  });

  it('moves in tenths when asked to be fine', () => {
    expect(moveWindow(windows, limits, 1, 300.14, 0.1)[1]).toEqual(at(300.1, 330.1));
  });

  it('leaves the others alone', () => {
    const moved = moveWindow(windows, limits, 1, 400);
    expect([moved[0], moved[2]]).toEqual([windows[0], windows[2]]);
  });
});

describe('resizing', () => {
  it('moves one edge only, up to the neighbour', () => {
    expect(resizeWindow(windows, limits, 1, 'end', 500.2)[1]).toEqual(at(300, 500));
    expect(resizeWindow(windows, limits, 1, 'end', 5000)[1]).toEqual(at(300, 900));
    expect(resizeWindow(windows, limits, 1, 'start', 0)[1]).toEqual(at(160, 330));
  });

  it('never turns the window inside out', () => {
    expect(resizeWindow(windows, limits, 1, 'end', 200)[1]).toEqual(at(300, 301));
    expect(resizeWindow(windows, limits, 1, 'start', 800)[1]).toEqual(at(329, 330));
  });
});

it('every sequence of drags leaves windows that the contract takes', () => {
  let state: Outage[] = [...windows];
  let seed = 7;
  const random = () => (seed = (seed * 48_271) % 2_147_483_647) / 2_147_483_647;
  for (let i = 0; i < 2000; i++) {
    const index = Math.floor(random() * state.length);
    const time = random() * 1400 - 200;
    const choice = random();
    if (choice < 0.4) state = moveWindow(state, limits, index, time);
    else if (choice < 0.9) state = resizeWindow(state, limits, index, choice < 0.6 ? 'start' : 'end', time);
    else {
      const drawn = drawOutage(state, limits, time, time + random() * 100);
      if (drawn && drawn.length <= 20) state = drawn;
    }
  }
  expect(outagesSchema.safeParse(state).success).toBe(true);
  expect(Math.min(...state.map((window) => window.startS))).toBeGreaterThanOrEqual(limits.startS);
  expect(Math.max(...state.map((window) => window.endS))).toBeLessThanOrEqual(limits.endS);
});

describe('typed times', () => {
  it.each([
    ['412', 412],
    ['6:52.5', 412.5],
    ['1:06:52', 4012],
    ['412,5 s', 412.5],
    ['soon', NaN],
    ['', NaN],
  ])('reads %p', (text, seconds) => expect(parseClock(text)).toEqual(seconds));

  it.each([
    [500, 60, null],
    [NaN, 60, 'start'],
    [500, 0.5, 'length'],
    [1200, 10, 'start'],
    [950, 100, 'start'],
    [880, 60, 'length'],
    [990, 60, 'length'],
  ])('judges start %p s, length %p s', (startS, lengthS, field) => {
    const problem = windowProblem(windows, limits, -1, startS, lengthS);
    expect(problem?.field ?? null).toBe(field);
    expect(problem === null || problem.message.includes(' s') || problem.message.includes('min:s')).toBe(
      true,
    );
  });
});

describe('placing by button', () => {
  it('takes the place asked for, or the first gap that is long enough', () => {
    expect(placeWindow(windows, limits, 500, 60)).toEqual(at(500, 560));
    expect(placeWindow(windows, limits, 880, 60)).toEqual(at(840, 900));
    expect(placeWindow(windows, limits, 120, 60)).toEqual(at(40, 100));
    expect(placeWindow(windows, limits, 120, 700)).toBeNull();
  });
});
