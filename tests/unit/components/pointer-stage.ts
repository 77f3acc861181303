/** An element for gesture tests: an event target with a place on the page, and pointers to move over it. */

export class Stage extends EventTarget {
  readonly style: Record<string, string> = {};
  private clock = 0;

  /** As the gestures take it: only these few members are used. */
  get element(): HTMLElement {
    return this as unknown as HTMLElement;
  }

  getBoundingClientRect() {
    return { left: 100, top: 50, width: 600, height: 100 };
  }

  /** Sends a pointer event at (x, y) of the element; answers it. */
  pointer(type: string, x: number, y = 20, more: Partial<PointerEvent> = {}): Event {
    this.clock += 16;
    return this.send(type, {
      pointerId: 1,
      pointerType: 'mouse',
      button: 0,
      shiftKey: false,
      timeStamp: this.clock,
      ...more,
      clientX: 100 + x,
      clientY: 50 + y,
    });
  }

  wheel(x: number, deltaY: number, deltaX = 0): Event {
    return this.send('wheel', { clientX: 100 + x, clientY: 60, deltaX, deltaY });
  }

  /** Lets time pass before the next event, ms. */
  wait(ms: number): void {
    this.clock += ms;
  }

  private send(type: string, members: object): Event {
    const event = new Event(type, { cancelable: true });
    for (const [name, value] of Object.entries(members)) Object.defineProperty(event, name, { value });
    this.dispatchEvent(event);
    return event;
  }
}
