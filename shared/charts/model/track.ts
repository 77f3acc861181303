/** A plan view: equal scale on both axes, north up. Pure. */
import { px } from './hatch';
import { ellipsePath } from './paths';

export interface PlanePoints {
  length: number;
  /** m */
  north: (index: number) => number;
  east: (index: number) => number;
}

export interface TrackFrame {
  /** Pixels a metre. */
  scale: number;
  x: (eastM: number) => number;
  y: (northM: number) => number;
  /** Metres of a pixel column and row. */
  eastAt: (x: number) => number;
  northAt: (y: number) => number;
}

export interface TrackBox {
  width: number;
  height: number;
  margin: number;
}

/** North–east extent of several tracks, or null when none has a point. */
export function planeExtent(
  tracks: readonly PlanePoints[],
): { north: [number, number]; east: [number, number] } | null {
  let [n0, n1, e0, e1] = [Infinity, -Infinity, Infinity, -Infinity];
  for (const track of tracks)
    for (let i = 0; i < track.length; i++) {
      const [north, east] = [track.north(i), track.east(i)];
      if (!Number.isFinite(north) || !Number.isFinite(east)) continue;
      n0 = Math.min(n0, north);
      n1 = Math.max(n1, north);
      e0 = Math.min(e0, east);
      e1 = Math.max(e1, east);
    }
  return n1 >= n0 ? { north: [n0, n1], east: [e0, e1] } : null;
}

/** Fits `extent` into the box with one scale for both axes. A standing vehicle still gets a few metres of ground. */
export function trackFrame(
  extent: { north: readonly [number, number]; east: readonly [number, number] },
  box: TrackBox,
): TrackFrame {
  const spanN = Math.max(LEAST_GROUND_M, extent.north[1] - extent.north[0]);
  const spanE = Math.max(LEAST_GROUND_M, extent.east[1] - extent.east[0]);
  const scale = Math.min(
    Math.max(1, box.width - 2 * box.margin) / spanE,
    Math.max(1, box.height - 2 * box.margin) / spanN,
  );
  const [midN, midE] = [(extent.north[0] + extent.north[1]) / 2, (extent.east[0] + extent.east[1]) / 2];
  return {
    scale,
    x: (east) => box.width / 2 + (east - midE) * scale,
    y: (north) => box.height / 2 - (north - midN) * scale,
    eastAt: (x) => midE + (x - box.width / 2) / scale,
    northAt: (y) => midN - (y - box.height / 2) / scale,
  };
}

/** A track as a path; points closer than half a pixel to the last one are left out, `cut` lifts the pen before a point. */
export function trackPath(
  points: PlanePoints,
  frame: TrackFrame,
  options: { from?: number; to?: number; cut?: (index: number) => boolean } = {},
): string {
  const { from = 0, to = points.length, cut } = options;
  let path = '';
  let [lastX, lastY] = [NaN, NaN];
  for (let i = from; i < to; i++) {
    const [x, y] = [frame.x(points.east(i)), frame.y(points.north(i))];
    if (!Number.isFinite(x) || !Number.isFinite(y)) {
      lastX = NaN;
      continue;
    }
    const lift = Number.isNaN(lastX) || (cut?.(i) ?? false);
    if (!lift && Math.abs(x - lastX) < 0.5 && Math.abs(y - lastY) < 0.5 && i + 1 < to) continue;
    path += `${lift ? 'M' : 'L'}${px(x)} ${px(y)}`;
    [lastX, lastY] = [x, y];
  }
  return path;
}

/** Points as dots, one a pixel cell. */
export function trackDots(points: PlanePoints, frame: TrackFrame): string {
  const seen = new Set<string>();
  for (let i = 0; i < points.length; i++) {
    const [x, y] = [frame.x(points.east(i)), frame.y(points.north(i))];
    if (Number.isFinite(x) && Number.isFinite(y)) seen.add(`M${Math.round(x)} ${Math.round(y)}h0`);
  }
  return [...seen].join('');
}

/** The ellipse of `sigmas` σ of a plane covariance about a point; empty when it would not be seen. */
export function sigmaEllipse(
  at: { northM: number; eastM: number; sigmaN: number; sigmaE: number; covNE: number },
  frame: TrackFrame,
  sigmas: number,
): string {
  const [vn, ve] = [at.sigmaN ** 2, at.sigmaE ** 2];
  const covNE = Number.isFinite(at.covNE) ? at.covNE : 0;
  const half = Math.hypot((vn - ve) / 2, covNE);
  const [major, minor] = [Math.sqrt((vn + ve) / 2 + half), Math.sqrt(Math.max(0, (vn + ve) / 2 - half))];
  const [a, b] = [major * sigmas * frame.scale, minor * sigmas * frame.scale];
  if (!(a >= LEAST_ELLIPSE_PX)) return '';
  // Bearing of the long axis from north towards east; on the page x is east and y points south.
  const bearing = 0.5 * Math.atan2(2 * covNE, vn - ve);
  return ellipsePath(frame.x(at.eastM), frame.y(at.northM), a, Math.max(b, 0.5), bearing - Math.PI / 2);
}

/** A round length (1, 2 or 5 × 10ⁿ m) whose bar is at most `mostPx` long. */
export function scaleBar(
  frame: TrackFrame,
  mostPx: number,
): { metres: number; widthPx: number; label: string } {
  const most = mostPx / frame.scale;
  const decade = 10 ** Math.floor(Math.log10(most));
  const digit = [5, 2, 1].find((one) => one * decade <= most) ?? 1;
  const metres = digit * decade;
  const label =
    metres >= 1000 ? `${metres / 1000} km` : metres >= 1 ? `${metres} m` : `${Math.round(metres * 100)} cm`;
  return { metres, widthPx: metres * frame.scale, label };
}

const LEAST_GROUND_M = 5;
const LEAST_ELLIPSE_PX = 1.5;

/** North and east of `origin` in metres, for distances of a recording (tangent plane, WGS-84 radii at the origin). */
export function planeOf(
  origin: { latDeg: number; lonDeg: number },
  latDeg: number,
  lonDeg: number,
): { north: number; east: number } {
  const lat = (origin.latDeg * Math.PI) / 180;
  const w2 = 1 - WGS84_E2 * Math.sin(lat) ** 2;
  const meridian = (WGS84_A * (1 - WGS84_E2)) / w2 ** 1.5;
  const normal = WGS84_A / Math.sqrt(w2);
  const radians = Math.PI / 180;
  return {
    north: (latDeg - origin.latDeg) * radians * meridian,
    east: (lonDeg - origin.lonDeg) * radians * normal * Math.cos(lat),
  };
}

const WGS84_A = 6_378_137;
const WGS84_E2 = 0.006_694_379_990_141_316;
