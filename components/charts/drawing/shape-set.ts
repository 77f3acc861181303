/**
 * The paths of one drawing, set on the page without a React render: frames arrive ten times a second and React need not know.
 * A path set before its shape is mounted is kept and given to it then.
 */

/** What react-native-svg gives as ref: on the web it holds the DOM element. */
interface ShapeHandle {
  elementRef?: { current: SVGElement | null };
  setNativeProps?: (props: object) => void;
}

export class ShapeSet {
  private readonly handles = new Map<string, ShapeHandle>();
  private readonly paths = new Map<string, string>();
  private readonly refs = new Map<string, (handle: unknown) => void>();

  /** The ref callback of the shape `key`; the same function at every call, so that React does not detach it. */
  ref(key: string): (handle: unknown) => void {
    const known = this.refs.get(key);
    if (known) return known;
    const attach = (handle: unknown) => {
      if (!handle) {
        this.handles.delete(key);
        return;
      }
      this.handles.set(key, handle);
      apply(handle, this.paths.get(key) ?? '');
    };
    this.refs.set(key, attach);
    return attach;
  }

  /** Gives the shape `key` the path `d`. */
  set(key: string, d: string): void {
    if (this.paths.get(key) === d) return;
    this.paths.set(key, d);
    const handle = this.handles.get(key);
    if (handle) apply(handle, d);
  }

  /** The path last given; for tests. */
  get(key: string): string | undefined {
    return this.paths.get(key);
  }
}

function apply(handle: ShapeHandle, d: string): void {
  const element = handle.elementRef?.current;
  if (element) element.setAttribute('d', d);
  else handle.setNativeProps?.({ d });
}
