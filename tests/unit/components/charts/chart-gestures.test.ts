import { bindChartGestures, chartKey } from '@/components/charts/chart-gestures';
import { ChartGroup } from '@/components/charts/chart-group';
import { Stage } from '../pointer-stage';

let frames: (() => void)[] = [];
beforeEach(() => {
  frames = [];
  globalThis.requestAnimationFrame = (callback) => frames.push(() => callback(0));
});

function stage() {
  const group = new ChartGroup([0, 1000]);
  const stage = new Stage();
  bindChartGestures(stage.element, group, () => ({ left: 50, right: 550 }));
  return { group, stage };
}

describe('mouse', () => {
  it('hovering moves the cursor of all charts, leaving takes it away', () => {
    const { group, stage: at } = stage();
    at.pointer('pointermove', 300);
    expect(group.cursor.current).toBe(500);
    at.pointer('pointerleave', 700);
    expect(group.cursor.current).toBeNull();
  });

  it('the wheel zooms about the pointer; out of the whole view it lets the page scroll', () => {
    const { group, stage: at } = stage();
    expect(at.wheel(300, 200).defaultPrevented).toBe(false);
    expect(at.wheel(300, -200).defaultPrevented).toBe(true);
    const [from, to] = group.viewport.current;
    expect((from + to) / 2).toBeCloseTo(500, 6);
    expect(to - from).toBeLessThan(1000);
  });

  it('dragging pans a zoomed view by the same seconds a pixel', () => {
    const { group, stage: at } = stage();
    group.viewport.show([400, 500]);
    at.pointer('pointerdown', 300);
    at.pointer('pointermove', 200);
    at.pointer('pointerup', 200);
    expect(group.viewport.current).toEqual([420, 520]);
  });

  it('shift and drag zooms to the stretch', () => {
    const { group, stage: at } = stage();
    at.pointer('pointerdown', 150, 20, { shiftKey: true });
    at.pointer('pointermove', 350, 20, { shiftKey: true });
    expect(group.brush.current).toEqual([200, 600]);
    expect(group.viewport.zoomed).toBe(false);
    at.pointer('pointerup', 350);
    expect(group.viewport.current).toEqual([200, 600]);
    expect(group.brush.current).toBeNull();
  });

  it('a brush that is broken off zooms nothing', () => {
    const { group, stage: at } = stage();
    at.pointer('pointerdown', 150, 20, { shiftKey: true });
    at.pointer('pointermove', 350, 20, { shiftKey: true });
    at.pointer('pointercancel', 350);
    expect(group.viewport.zoomed).toBe(false);
    expect(group.brush.current).toBeNull();
  });

  it('a double click shows all again', () => {
    const { group, stage: at } = stage();
    group.viewport.show([400, 500]);
    for (let i = 0; i < 2; i++) {
      at.pointer('pointerdown', 300);
      at.pointer('pointerup', 300);
    }
    expect(group.viewport.current).toEqual([0, 1000]);
  });

  it('two slow clicks do not', () => {
    const { group, stage: at } = stage();
    group.viewport.show([400, 500]);
    for (let i = 0; i < 2; i++) {
      at.pointer('pointerdown', 300);
      at.pointer('pointerup', 300);
      at.wait(600);
    }
    expect(group.viewport.current).toEqual([400, 500]);
    expect(group.cursor.current).toBe(450);
  });
});

describe('touch', () => {
  const finger = (pointerId: number) => ({ pointerType: 'touch', pointerId });

  it('two fingers spread zoom in about their middle', () => {
    const { group, stage: at } = stage();
    at.pointer('pointerdown', 250, 20, finger(1));
    at.pointer('pointerdown', 350, 20, finger(2));
    at.pointer('pointermove', 200, 20, finger(1));
    at.pointer('pointermove', 400, 20, finger(2));
    const [from, to] = group.viewport.current;
    expect(to - from).toBeCloseTo(500, 6);
    expect((from + to) / 2).toBeCloseTo(500, 6);
  });

  it('one finger moves the cursor while all is in view', () => {
    const { group, stage: at } = stage();
    at.pointer('pointerdown', 100, 20, finger(1));
    at.pointer('pointermove', 175, 20, finger(1));
    at.pointer('pointerup', 175, 20, finger(1));
    expect(group.cursor.current).toBe(250);
    expect(group.viewport.zoomed).toBe(false);
  });
});

describe('keys', () => {
  it('move the cursor, zoom and show all', () => {
    const { group } = stage();
    expect(chartKey(group, 'ArrowRight', false)).toBe(true);
    expect(group.cursor.current).toBe(525);
    chartKey(group, 'ArrowLeft', true);
    expect(group.cursor.current).toBe(522.5);
    chartKey(group, '+', false);
    expect(group.viewport.zoomed).toBe(true);
    chartKey(group, '0', false);
    expect(group.viewport.zoomed).toBe(false);
    chartKey(group, 'Escape', false);
    expect(group.cursor.current).toBeNull();
    expect(chartKey(group, 'q', false)).toBe(false);
  });

  it('bring the view along when the cursor leaves it', () => {
    const { group } = stage();
    group.viewport.show([100, 200]);
    group.cursor.set(199);
    chartKey(group, 'ArrowRight', false);
    expect(group.cursor.current).toBe(201.5);
    expect(group.viewport.current[1]).toBeCloseTo(201.5, 6);
  });
});

describe('redraws', () => {
  it('any number of changes before a frame make one redraw of each chart', () => {
    const { group } = stage();
    let drawn = 0;
    group.add(() => drawn++);
    for (let i = 0; i < 50; i++) group.viewport.show([i, i + 100]);
    group.invalidate();
    expect(frames).toHaveLength(1);
    frames[0]!();
    expect(drawn).toBe(1);
  });

  it('a chart that is gone is not drawn', () => {
    const { group } = stage();
    let drawn = 0;
    const remove = group.add(() => drawn++);
    remove();
    for (const frame of frames) frame();
    expect(drawn).toBe(0);
  });
});
