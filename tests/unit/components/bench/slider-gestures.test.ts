import { bindSliderGestures } from '@/components/bench/slider-gestures';
import { Stage } from '../pointer-stage';

function open(fraction = 0.5, locked = false) {
  const state = { fraction, settled: true, resets: 0, changes: 0 };
  const stage = new Stage();
  bindSliderGestures(stage.element, {
    locked: () => locked,
    fraction: () => state.fraction,
    span: () => ({ left: 0, right: 200 }),
    change: (next, settled) => Object.assign(state, { fraction: next, settled, changes: state.changes + 1 }),
    reset: () => state.resets++,
  });
  return { state, stage };
}
const touch = { pointerType: 'touch' };

describe('mouse', () => {
  it('jumps to where it presses beside the thumb, and drags from there', () => {
    const { state, stage } = open();
    stage.pointer('pointerdown', 150);
    expect(state).toMatchObject({ fraction: 0.75, settled: false });
    stage.pointer('pointermove', 160);
    stage.pointer('pointerup', 160);
    expect(state.fraction).toBeCloseTo(0.8, 9);
    expect(state.settled).toBe(true);
  });

  it('takes the thumb where it is held, without a jump', () => {
    const { state, stage } = open();
    stage.pointer('pointerdown', 106);
    expect(state.changes).toBe(0);
    stage.pointer('pointermove', 126);
    stage.pointer('pointerup', 126);
    expect(state.fraction).toBeCloseTo(0.6, 9);
  });

  it('moves ten times slower with shift', () => {
    const { state, stage } = open();
    stage.pointer('pointerdown', 100);
    stage.pointer('pointermove', 120, 20, { shiftKey: true });
    stage.pointer('pointerup', 120);
    expect(state.fraction).toBeCloseTo(0.51, 9);
  });

  it('stops at the ends', () => {
    const { state, stage } = open();
    stage.pointer('pointerdown', 100);
    stage.pointer('pointermove', 900);
    stage.pointer('pointerup', 900);
    expect(state.fraction).toBe(1);
  });

  it('two quick presses return to the baseline', () => {
    const { state, stage } = open();
    stage.pointer('pointerdown', 100);
    stage.pointer('pointerup', 100);
    stage.pointer('pointerdown', 100);
    stage.pointer('pointerup', 100);
    expect(state.resets).toBe(1);
  });
});

describe('touch', () => {
  it('moves the thumb relatively: a tap beside it changes nothing', () => {
    const { state, stage } = open();
    stage.pointer('pointerdown', 20, 20, touch);
    stage.pointer('pointerup', 20, 20, touch);
    expect(state.changes).toBe(0);
    stage.wait(1000);
    stage.pointer('pointerdown', 20, 20, touch);
    stage.pointer('pointermove', 40, 20, touch);
    stage.pointer('pointerup', 40, 20, touch);
    expect(state.fraction).toBeCloseTo(0.6, 9);
  });

  it('does not move while the sheet scrolls', () => {
    const { state, stage } = open();
    stage.pointer('pointerdown', 100, 20, touch);
    stage.pointer('pointermove', 102, 60, touch);
    stage.pointer('pointercancel', 102, 90, touch);
    expect(state.changes).toBe(0);
  });
});

it('nothing moves a locked slider', () => {
  const { state, stage } = open(0.5, true);
  stage.pointer('pointerdown', 150);
  stage.pointer('pointermove', 180);
  stage.pointer('pointerup', 180);
  expect(state).toMatchObject({ fraction: 0.5, changes: 0 });
});
