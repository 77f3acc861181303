import { bindStripGestures, hitWindow } from '@/components/strip/strip-gestures';
import { windowKey } from '@/components/strip/window-keys';
import { stretchAt, type Stretch } from '@/components/strip/stretches';
import { drawOutage, drawWindow, type WindowLimits } from '@/components/strip/window-model';
import { linearScale } from '@/shared/charts/model/scale';
import type { Outage } from '@/shared/contracts/runs';
import { Stage } from '../pointer-stage';

const at = (startS: number, endS: number): Outage => ({ startS, endS, withhold: 'gnss' });
/** 600 px for 1200 s: half a pixel a second. */
const x = linearScale([0, 1200], [0, 600]);
const limits = { startS: 0, endS: 1200 };

function open(initial: Outage[], editable = true) {
  const state = {
    windows: initial,
    settled: true,
    selected: null as number | null,
    cursor: null as number | null,
  };
  const stage = new Stage();
  bindStripGestures(stage.element, {
    x: () => x,
    limits: () => limits,
    windows: () => state.windows,
    editable: () => editable,
    draw: (before, fromS, toS, snapS) => drawOutage(before, limits, fromS, toS, snapS),
    change: (windows, settled) => Object.assign(state, { windows, settled }),
    select: (selected) => Object.assign(state, { selected }),
    cursor: (cursor) => Object.assign(state, { cursor }),
  });
  return { state, stage };
}

describe('what lies under the pointer', () => {
  const windows = [at(400, 600), at(800, 810)];

  it.each([
    [150, 22, null],
    [190, 22, { index: 0, part: 'start' }],
    [205, 22, { index: 0, part: 'start' }],
    [250, 22, { index: 0, part: 'body' }],
    [295, 9, { index: 0, part: 'end' }],
    [312, 9, null],
    [312, 22, { index: 0, part: 'end' }],
    // 5 px wide: its middle still moves it, its edges reach outwards.
    [402.5, 22, { index: 1, part: 'body' }],
    [390, 22, { index: 1, part: 'start' }],
    [415, 22, { index: 1, part: 'end' }],
  ])('at %d px with a reach of %d px: %p', (pixel, reach, expected) => {
    expect(hitWindow(windows, x, pixel, reach)).toEqual(expected);
  });
});

describe('snapping and the clock', () => {
  function openAll(initial: Outage[], snaps = true) {
    const state = { windows: initial, brush: [] as [number, number, boolean][], taps: 0 };
    const stage = new Stage();
    bindStripGestures<Outage>(stage.element, {
      x: () => x,
      limits: () => limits,
      windows: () => state.windows,
      editable: () => true,
      draw: (before, fromS, toS, by) => drawOutage(before, limits, fromS, toS, by),
      change: (windows) => void (state.windows = windows),
      select: () => undefined,
      cursor: () => undefined,
      snap: (timeS, others, reachS) =>
        others.find((other) => Math.abs(other.startS - timeS) <= reachS)?.startS ??
        Math.round(timeS / 10) * 10,
      snaps: () => snaps,
      clockTop: () => 80,
      brush: ([from, to], done) => void state.brush.push([from, to, done]),
      clockTap: () => void state.taps++,
    });
    return { state, stage };
  }
  const drag = (stage: Stage, from: number, to: number, y = 20, more: Partial<PointerEvent> = {}) => {
    stage.pointer('pointerdown', from, y, more);
    stage.pointer('pointermove', to, y, more);
    stage.pointer('pointerup', to, y, more);
  };

  it('rests where the rule says, drawn to the edges of the other windows', () => {
    const { state, stage } = openAll([at(800, 860)]);
    drag(stage, 101, 131);
    expect(state.windows[0]).toEqual(at(200, 260));
    drag(stage, 130, 397);
    expect(state.windows[0]).toEqual(at(200, 800));
  });

  it('is off with Alt, and where it was switched off', () => {
    const free = openAll([]);
    drag(free.stage, 101.2, 131.7, 20, { altKey: true });
    expect(free.state.windows).toEqual([at(202.4, 263.4)]);
    const off = openAll([], false);
    drag(off.stage, 101.2, 131.7);
    expect(off.state.windows).toEqual([at(202.4, 263.4)]);
  });

  it('along the clock picks a stretch and draws no window; a tap there lets the zoom go', () => {
    const { state, stage } = openAll([at(800, 860)]);
    drag(stage, 500, 200, 90);
    expect(state.windows).toEqual([at(800, 860)]);
    expect(state.brush).toEqual([
      [400, 1000, false],
      [400, 1000, true],
    ]);
    stage.pointer('pointerdown', 300, 90);
    stage.pointer('pointerup', 300, 90);
    expect(state.taps).toBe(1);
  });

  it('picks nothing when the page takes the finger over', () => {
    const { state, stage } = openAll([]);
    stage.pointer('pointerdown', 200, 90);
    stage.pointer('pointermove', 300, 90);
    stage.pointer('pointercancel', 300, 90);
    expect(state.brush.some(([, , done]) => done)).toBe(false);
  });
});

describe('dragging', () => {
  it('on empty ground draws a window, live, and selects it', () => {
    const { state, stage } = open([at(800, 860)]);
    stage.pointer('pointerdown', 100);
    stage.pointer('pointermove', 115);
    expect(state).toMatchObject({ windows: [at(200, 230), at(800, 860)], settled: false });
    stage.pointer('pointermove', 130);
    stage.pointer('pointerup', 130);
    expect(state).toMatchObject({ windows: [at(200, 260), at(800, 860)], settled: true, selected: 0 });
  });

  it('a body moves the window, an edge resizes it', () => {
    const { state, stage } = open([at(200, 300)]);
    stage.pointer('pointerdown', 125);
    stage.pointer('pointermove', 150);
    stage.pointer('pointerup', 150);
    expect(state.windows).toEqual([at(250, 350)]);
    stage.pointer('pointerdown', 175);
    stage.pointer('pointermove', 200);
    stage.pointer('pointerup', 200);
    expect(state.windows).toEqual([at(250, 400)]);
  });

  it('with shift is fine', () => {
    const { state, stage } = open([at(200, 300)]);
    stage.pointer('pointerdown', 125);
    stage.pointer('pointermove', 131.07, 20, { shiftKey: true });
    stage.pointer('pointerup', 131.07, 20, { shiftKey: true });
    expect(state.windows).toEqual([at(212.1, 312.1)]);
  });

  it('that turns into scrolling on a touch screen changes nothing', () => {
    const { state, stage } = open([at(200, 300)]);
    const touch = { pointerType: 'touch' };
    stage.pointer('pointerdown', 125, 20, touch);
    stage.pointer('pointermove', 135, 40, touch);
    stage.pointer('pointercancel', 135, 90, touch);
    expect(state).toMatchObject({ windows: [at(200, 300)], settled: true });
  });

  it('a press without a move selects a window, or puts the cursor on empty ground', () => {
    const { state, stage } = open([at(200, 300)]);
    stage.pointer('pointerdown', 125);
    stage.pointer('pointerup', 125);
    expect(state).toMatchObject({ windows: [at(200, 300)], selected: 0 });
    stage.pointer('pointerdown', 400);
    stage.pointer('pointerup', 400);
    expect(state).toMatchObject({ windows: [at(200, 300)], selected: null, cursor: 800 });
  });

  it('only moves the cursor for those who may not draw', () => {
    const { state, stage } = open([at(200, 300)], false);
    stage.pointer('pointerdown', 125);
    stage.pointer('pointermove', 300);
    stage.pointer('pointerup', 300);
    expect(state).toMatchObject({ windows: [at(200, 300)], selected: null, cursor: 600 });
  });
});

describe('choosing one stretch', () => {
  function choosing(initial: WindowLimits[]) {
    const state = { windows: initial, tapped: null as number | null };
    const stage = new Stage();
    bindStripGestures<WindowLimits>(stage.element, {
      x: () => x,
      limits: () => limits,
      windows: () => state.windows,
      editable: () => true,
      drawsInside: true,
      draw: (_, fromS, toS, snapS) => {
        const drawn = drawWindow([], limits, fromS, toS, snapS);
        return drawn && [drawn];
      },
      change: (windows) => Object.assign(state, { windows }),
      select: () => undefined,
      cursor: () => undefined,
      tap: (tapped) => Object.assign(state, { tapped }),
    });
    return { state, stage };
  }

  it.each([
    ['inside the one that is chosen', 200, 250, { startS: 400, endS: 500 }],
    ['across its edge and beyond', 150, 400, { startS: 300, endS: 800 }],
    ['on an edge: resizes it', 100, 50, { startS: 100, endS: 1000 }],
  ])('a drag %s', (_, from, to, expected) => {
    const { state, stage } = choosing([{ startS: 200, endS: 1000 }]);
    stage.pointer('pointerdown', from);
    stage.pointer('pointermove', to);
    stage.pointer('pointerup', to);
    expect(state).toEqual({ windows: [expected], tapped: null });
  });

  it('a tap says where, even inside the chosen one', () => {
    const { state, stage } = choosing([{ startS: 200, endS: 1000 }]);
    stage.pointer('pointerdown', 250);
    stage.pointer('pointerup', 250);
    expect(state.tapped).toBe(500);
  });

  it('of overlapping stretches the shortest is under the finger', () => {
    const found: Stretch[] = [[0, 400], [100, 200], [500, 600]]; // prettier-ignore
    expect(stretchAt(found, 150)).toEqual([100, 200]);
    expect(stretchAt(found, 300)).toEqual([0, 400]);
    expect(stretchAt(found, 450)).toBeNull();
    expect(stretchAt(found, 470, 40)).toEqual([500, 600]);
    expect(stretchAt(found, 450, 40)).toBeNull();
  });
});

describe('keys on a window', () => {
  const windows = [at(100, 160), at(300, 330)];
  const press = (part: 'start' | 'end' | 'body', key: string, shift = false) =>
    windowKey(windows, limits, 1, part, key, shift)?.[1];

  it.each([
    ['body', 'ArrowRight', false, at(301, 331)],
    ['body', 'ArrowLeft', true, at(299.9, 329.9)],
    ['body', 'PageUp', false, at(310, 340)],
    ['start', 'ArrowLeft', false, at(299, 330)],
    ['end', 'ArrowUp', true, at(300, 330.1)],
  ] as const)('%s, %s, shift %p', (part, key, shift, expected) => {
    expect(press(part, key, shift)).toEqual(expected);
  });

  it('Delete removes the window, other keys are left alone', () => {
    expect(windowKey(windows, limits, 1, 'body', 'Delete', false)).toEqual([windows[0]]);
    expect(windowKey(windows, limits, 1, 'body', 'x', false)).toBeNull();
  });
});
