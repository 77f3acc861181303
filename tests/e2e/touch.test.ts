/**
 * The bench under fingers, by real touch events: windows drawn, moved and resized on the strip, the clock as a brush, charts
 * pinched and let go; and a chart saved. On the phone.
 */
import { readFileSync } from 'node:fs';
import type { Browser, CDPSession, Locator, Page } from 'playwright-core';
import { XMLValidator } from 'fast-xml-parser';
import { DEMO_PASSWORD, DEMO_PEOPLE } from '@/fixtures/demo-scenario';
import { launchBrowser, openWindow } from '@/tests/support/browser';
import { Stack } from '@/tests/support/stack';
import { button, runIsDone, signIn, strip } from './steps';

let stack: Stack;
let browser: Browser;
let page: Page;
let touch: CDPSession;
let faults: string[];

beforeAll(async () => {
  stack = await Stack.boot(process.env.TEST_POSTGRES_URL!, { demo: true });
  browser = await launchBrowser();
  ({ page, faults } = await openWindow(browser, stack.url, { viewport: 'phone' }));
  touch = await page.context().newCDPSession(page);
  await signIn(page, DEMO_PEOPLE.find(({ role }) => role === 'engineer')!.email, DEMO_PASSWORD);
  await page.goto('/recordings');
  await page
    .getByRole('link', { name: /Breakwater loop/ })
    .first()
    .click();
  await button(page, 'Open in bench').click();
  await runIsDone(page);
});
afterAll(async () => {
  await browser?.close();
  await stack?.stop();
});

type Point = readonly [x: number, y: number];

const send = (type: 'touchStart' | 'touchMove' | 'touchEnd', points: readonly Point[]) =>
  touch.send('Input.dispatchTouchEvent', {
    type,
    touchPoints: points.map(([x, y], id) => ({ x, y, id })),
  });

/** Fingers from their first places to their last ones, in steps. */
async function fingers(from: readonly Point[], to: readonly Point[]): Promise<void> {
  await send('touchStart', from);
  for (const share of [0.2, 0.4, 0.6, 0.8, 1]) {
    const between = (a: number, b: number) => a + share * (b - a);
    await send(
      'touchMove',
      from.map(([x, y], i) => [between(x, to[i]![0]), between(y, to[i]![1])] as const),
    );
  }
  await send('touchEnd', []);
}

/** A point of an element, by shares of its width and height. */
async function pointOf(target: Locator, across: number, down: number): Promise<Point> {
  await target.scrollIntoViewIfNeeded();
  const box = await target.boundingBox();
  if (!box) throw new Error('What is to be touched is not on screen.');
  return [box.x + across * box.width, box.y + down * box.height];
}

const edge = (which: 'start' | 'end') => page.getByRole('slider', { name: `Outage window 1, ${which}` });
const timeOf = async (which: 'start' | 'end') => Number(await edge(which).getAttribute('aria-valuenow'));
const lengthOf = async () => (await timeOf('end')) - (await timeOf('start'));

/** A place on the strip at a time of the recording; half-way up where windows are. */
async function atTime(timeS: number, down = 0.4): Promise<Point> {
  const [whole] = await wholeSpan();
  const box = (await strip(page).boundingBox())!;
  const inset = 10;
  return [box.x + inset + (timeS / whole) * (box.width - 2 * inset), box.y + down * box.height];
}
async function wholeSpan(): Promise<[number]> {
  const label = (await strip(page).getAttribute('aria-label'))!;
  return [Number(/(\d+) s long/.exec(label)![1])];
}

const chart = () => page.getByRole('group', { name: /^Coasting error, horizontal/ });
/** The stretch that the charts show, by the caption of the chart's table. */
async function shownSpan(): Promise<[number, number]> {
  const caption = await page.locator('caption', { hasText: 'Coasting error, horizontal' }).innerText();
  const seconds = (text: string) => text.split(':').reduce((sum, part) => 60 * sum + Number(part), 0);
  const [, from, to] = /([\d:]+) to ([\d:]+)/.exec(caption)!;
  return [seconds(from!), seconds(to!)];
}

test('a finger draws a window', async () => {
  await fingers([await atTime(300)], [await atTime(420)]);
  await edge('start').waitFor();
  expect(Math.abs((await timeOf('start')) - 300)).toBeLessThan(8);
  expect(Math.abs((await timeOf('end')) - 420)).toBeLessThan(8);
  await runIsDone(page);
});

test('moves it by its body, with its length', async () => {
  const [start, length] = [await timeOf('start'), await lengthOf()];
  await fingers([await atTime(start + length / 2)], [await atTime(start + length / 2 + 200)]);
  expect(Math.abs((await timeOf('start')) - start - 200)).toBeLessThan(8);
  expect(await lengthOf()).toBeCloseTo(length, 3);
});

test('resizes it by an edge, a finger’s width beside it', async () => {
  const [start, end] = [await timeOf('start'), await timeOf('end')];
  const [x, y] = await atTime(end);
  const [to] = await atTime(end + 150);
  await fingers([[x + 12, y]], [[to + 12, y]]);
  expect(await timeOf('start')).toBe(start);
  expect(Math.abs((await timeOf('end')) - end - 150)).toBeLessThan(8);
  await runIsDone(page);
});

test('picks a stretch along the clock, and a tap there shows all again', async () => {
  await fingers([await atTime(200, 0.93)], [await atTime(800, 0.93)]);
  const [from, to] = await shownSpan();
  expect(Math.abs(from - 200)).toBeLessThan(10);
  expect(Math.abs(to - 800)).toBeLessThan(10);
  const tap = await atTime(500, 0.93);
  await send('touchStart', [tap]);
  await send('touchEnd', []);
  await expect(shownSpan()).resolves.toEqual([0, (await wholeSpan())[0]]);
});

test('two fingers zoom a chart, one pans it, a double tap shows all again', async () => {
  await chart().scrollIntoViewIfNeeded();
  const [a, b, c, d] = await Promise.all(
    [0.45, 0.6, 0.25, 0.85].map((across) => pointOf(chart(), across, 0.5)),
  );
  await fingers([a!, b!], [c!, d!]);
  const zoomed = await shownSpan();
  const [whole] = await wholeSpan();
  expect(zoomed[1] - zoomed[0]).toBeLessThan(0.4 * whole);
  await fingers([d!], [c!]);
  const panned = await shownSpan();
  expect(panned[0]).toBeGreaterThan(zoomed[0]);
  expect(Math.abs(panned[1] - panned[0] - (zoomed[1] - zoomed[0]))).toBeLessThan(2);
  for (let tap = 0; tap < 2; tap++) {
    await send('touchStart', [a!]);
    await send('touchEnd', []);
  }
  await expect(shownSpan()).resolves.toEqual([0, whole]);
});

test('a chart is saved as a picture and as figures', async () => {
  const saved = async (choice: RegExp) => {
    await button(page, 'Save Coasting error, horizontal').tap();
    const download = page.waitForEvent('download');
    await button(page, choice).tap();
    const file = await download;
    return { name: file.suggestedFilename(), path: await file.path() };
  };
  const svg = await saved(/^Picture, SVG/);
  expect(svg.name).toMatch(/^breakwater-loop.*_coasting-error-horizontal_run-[0-9a-f]{8}\.svg$/);
  expect(XMLValidator.validate(readFileSync(svg.path, 'utf8'))).toBe(true);
  const png = await saved(/^Picture, PNG/);
  const bytes = readFileSync(png.path);
  expect(bytes.subarray(1, 4).toString()).toBe('PNG');
  expect(bytes.readUInt32BE(16)).toBe(1920);
  const csv = await saved(/^All data, CSV/);
  expect(readFileSync(csv.path, 'utf8').split('\r\n')[0]).toBe('time_s,predicted_95_m,error_m');
});

test('nothing went wrong meanwhile', () => expect(faults).toEqual([]));
