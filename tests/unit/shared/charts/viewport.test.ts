import { Cursor, LEAST_SPAN_S, Viewport } from '@/shared/charts/model/viewport';

describe('Viewport', () => {
  it('zooms about a time that stays where it is', () => {
    const view = new Viewport([0, 1000]);
    view.zoom(0.5, 250);
    expect(view.current).toEqual([125, 625]);
    expect(view.zoomed).toBe(true);
  });

  it('never leaves the whole, and keeps its span at the ends', () => {
    const view = new Viewport([0, 1000]);
    view.show([900, 1100]);
    expect(view.current).toEqual([800, 1000]);
    view.pan(-5000);
    expect(view.current).toEqual([0, 200]);
    view.zoom(100, 100);
    expect(view.current).toEqual([0, 1000]);
  });

  it('says when a zoom changed nothing, so that the page may scroll', () => {
    const view = new Viewport([0, 1000]);
    expect(view.zoom(1.2, 300)).toBe(false);
    expect(view.zoom(0.8, 300)).toBe(true);
  });

  it('stops before a single sample fills the screen', () => {
    const view = new Viewport([0, 1000]);
    view.show([500, 500.01]);
    expect(view.current[1] - view.current[0]).toBeCloseTo(LEAST_SPAN_S, 9);
  });

  it('follows a new whole only while it is not zoomed', () => {
    const view = new Viewport([0, 100]);
    view.setExtent([0, 200]);
    expect(view.current).toEqual([0, 200]);
    view.show([50, 60]);
    view.setExtent([0, 300]);
    expect(view.current).toEqual([50, 60]);
  });

  it('tells its listeners of changes only, until they leave', () => {
    const view = new Viewport([0, 100]);
    let heard = 0;
    const leave = view.subscribe(() => heard++);
    view.show([10, 20]);
    view.show([10, 20]);
    view.reset();
    leave();
    view.show([30, 40]);
    expect(heard).toBe(2);
  });
});

it('Cursor tells of changes only', () => {
  const cursor = new Cursor();
  let heard = 0;
  cursor.subscribe(() => heard++);
  cursor.set(5);
  cursor.set(5);
  cursor.set(null);
  expect(heard).toBe(2);
});
