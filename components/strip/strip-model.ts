/** The strip's geometry: a thin drawing of a whole recording. Pure; Strip.tsx and StripEditor.tsx only draw what is said here. */
import type { Strip } from '@/shared/contracts/recordings';
import { px } from '@/shared/charts/model/hatch';
import { linearScale, type Scale } from '@/shared/charts/model/scale';

export interface StripLayout {
  width: number;
  /** Left and right margin inside which the recording lies, px. */
  inset: number;
  profileTop: number;
  /** The ground line of the speed profile, px. */
  baseY: number;
  tickTop: number;
  tickBottom: number;
}

export interface StripGeometry {
  layout: StripLayout;
  /** Recording time, s → px. */
  x: Scale;
  /** Closed path of the speed profile. */
  profile: string;
  /** Ground line where the IMU has samples; broken in its gaps. */
  ground: string;
  /** GNSS present at about its usual rate. */
  fixes: string;
  /** Fewer fixes than half the usual. */
  sparse: string;
  /** Stretches at the sensor's range, px. */
  clipped: { x: number; width: number }[];
  /** IMU stretches without samples, px. */
  gaps: { x: number; width: number }[];
  /** Speed at the profile's full height. */
  topSpeedMPerS: number;
}

/** Heights of the parts for a strip `height` px high whose time labels take `labelsHeight` px below. */
export function stripLayout(width: number, height: number, inset: number, labelsHeight = 0): StripLayout {
  const inner = height - labelsHeight;
  const tick = Math.max(5, Math.min(12, Math.round(inner * 0.16)));
  const tickBottom = inner - 1;
  const tickTop = tickBottom - tick;
  return { width, inset, profileTop: 2, baseY: tickTop - 3, tickTop, tickBottom };
}

/** Draws `strip` into `layout`. */
export function stripGeometry(strip: Strip, layout: StripLayout): StripGeometry {
  const x = linearScale([strip.startS, strip.endS], [layout.inset, layout.width - layout.inset]);
  const speeds = strip.speedMPerS.map((speed) => (Number.isFinite(speed) ? speed : null));
  const topSpeedMPerS = speeds.reduce<number>((top, speed) => Math.max(top, speed ?? 0), LEAST_TOP_M_S);
  return {
    layout,
    x,
    profile: profilePath(speeds, strip, x, layout, topSpeedMPerS),
    ground: groundPath(strip, x, layout.baseY),
    ...fixTicks(strip, x, layout),
    clipped: strip.clippedS.map((span) => spanPx(span, x, 3)),
    gaps: strip.gapsS.map((span) => spanPx(span, x, 2)),
    topSpeedMPerS,
  };
}

/** A time span in pixels, at least `least` wide so that a short one is seen. */
export function spanPx(span: readonly [number, number], x: Scale, least: number) {
  const [from, to] = [x(span[0]), x(span[1])];
  const width = Math.max(least, to - from);
  return { x: (from + to - width) / 2, width };
}

/** The strip in a sentence, for the screen reader. */
export function stripSentence(strip: Strip, outageCount: number): string {
  const total = strip.endS - strip.startS;
  const fixes = strip.gnssFixes.reduce((sum, count) => sum + count, 0);
  const silent = strip.gnssFixes.filter((count) => count === 0).length / Math.max(1, strip.gnssFixes.length);
  const parts = [
    `${Math.round(total)} s long`,
    `${fixes} GNSS fixes`,
    silent >= 0.005 ? `${Math.round(silent * 100)} % of it without fixes` : '',
    strip.gapsS.length > 0 ? `${strip.gapsS.length} IMU gaps` : '',
    strip.clippedS.length > 0 ? `${strip.clippedS.length} clipped stretches` : '',
    outageCount > 0 ? `${outageCount} outage windows` : '',
  ];
  return `Recording strip: ${parts.filter(Boolean).join(', ')}.`;
}

function profilePath(
  speeds: (number | null)[],
  strip: Strip,
  x: Scale,
  layout: StripLayout,
  top: number,
): string {
  const height = layout.baseY - layout.profileTop;
  const y = (speed: number) => layout.baseY - (top > 0 ? (speed / top) * height : 0);
  const bucket = (strip.endS - strip.startS) / Math.max(1, speeds.length);
  let path = '';
  let open = false;
  speeds.forEach((speed, i) => {
    const middle = px(x(strip.startS + (i + 0.5) * bucket));
    if (speed === null) {
      if (open) path += `V${px(layout.baseY)}Z`;
      open = false;
      return;
    }
    if (!open) path += `M${px(x(strip.startS + i * bucket))} ${px(layout.baseY)}V${px(y(speed))}`;
    path += `L${middle} ${px(y(speed))}`;
    const last = i + 1 === speeds.length || speeds[i + 1] === null;
    if (last) path += `H${px(x(strip.startS + (i + 1) * bucket))}V${px(layout.baseY)}Z`;
    open = !last;
  });
  return path;
}

function groundPath(strip: Strip, x: Scale, y: number): string {
  const gaps = [...strip.gapsS].sort((a, b) => a[0] - b[0]);
  let from = strip.startS;
  let path = '';
  for (const [start, end] of gaps) {
    if (start > from) path += `M${px(x(from))} ${px(y)}H${px(x(start))}`;
    from = Math.max(from, end);
  }
  return from < strip.endS ? `${path}M${px(x(from))} ${px(y)}H${px(x(strip.endS))}` : path;
}

/** One tick every few pixels; its place stands for all fixes of the buckets between it and the next. */
function fixTicks(strip: Strip, x: Scale, layout: StripLayout): { fixes: string; sparse: string } {
  const buckets = strip.gnssFixes.length;
  const room = layout.width - 2 * layout.inset;
  if (buckets === 0 || room <= 0) return { fixes: '', sparse: '' };
  const count = Math.max(1, Math.min(buckets, Math.floor(room / TICK_SPACING_PX)));
  const rates = Array.from({ length: count }, (_, i) => {
    const from = Math.floor((i * buckets) / count);
    const to = Math.max(from + 1, Math.floor(((i + 1) * buckets) / count));
    const part = strip.gnssFixes.slice(from, to);
    return part.reduce((sum, fixes) => sum + fixes, 0) / part.length;
  });
  const present = rates.filter((rate) => rate > 0).sort((a, b) => a - b);
  const usual = present[Math.floor(present.length / 2)] ?? 0;
  const seconds = (strip.endS - strip.startS) / count;
  const half = (layout.tickBottom - layout.tickTop) / 2;
  let [fixes, sparse] = ['', ''];
  rates.forEach((rate, i) => {
    if (rate === 0) return;
    const at = px(x(strip.startS + (i + 0.5) * seconds));
    if (rate >= usual / 2) fixes += `M${at} ${px(layout.tickTop)}V${px(layout.tickBottom)}`;
    else sparse += `M${at} ${px(layout.tickTop)}v${px(half)}`;
  });
  return { fixes, sparse };
}

const TICK_SPACING_PX = 6;
/** A vehicle that stands still shows as flat ground, not as the noise of its fixes blown up. */
const LEAST_TOP_M_S = 1;
