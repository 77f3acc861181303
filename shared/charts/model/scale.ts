/** Maps between values and pixels. */

export type Extent = readonly [number, number];

export interface Scale {
  domain: Extent;
  range: Extent;
  /** Value → pixel. */
  (value: number): number;
  /** Pixel → value. */
  invert(pixel: number): number;
}

/** `value ↦ pixel` with `domain` onto `range`. Plain arithmetic: it is called for every point of every frame. */
export function linearScale(domain: Extent, range: Extent): Scale {
  const span = domain[1] - domain[0] || 1;
  const perUnit = (range[1] - range[0]) / span;
  const map = (value: number) => range[0] + (value - domain[0]) * perUnit;
  return Object.assign(map, {
    domain,
    range,
    invert: (pixel: number) => domain[0] + (pixel - range[0]) / perUnit,
  });
}

/** Logarithmic map; both ends of `domain` are above zero. What is not above zero has no place: −∞ or NaN. */
export function logScale(domain: Extent, range: Extent): Scale {
  const inner = linearScale([Math.log(domain[0]), Math.log(domain[1])], range);
  return Object.assign((value: number) => inner(Math.log(value)), {
    domain,
    range,
    invert: (pixel: number) => Math.exp(inner.invert(pixel)),
  });
}
