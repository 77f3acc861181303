/** An analysis as the curves of one sensor's chart, in its display unit. */
import type { NoiseAnalysis } from '@/shared/contracts/noise';
import type { SensorFigures } from '@/shared/contracts/vehicles';
import { displayUnit, type DisplayUnits } from '@/shared/display-units';
import { figureOf, SENSORS, type Sensor } from './sensors';

export interface AllanCurve {
  axis: 'x' | 'y' | 'z';
  points: { tauS: number; deviation: number; low: number; high: number; model: number }[];
}

export function allanCurves(
  analysis: NoiseAnalysis,
  sensor: Sensor,
  chosen: DisplayUnits = {},
): AllanCurve[] {
  const { toSi } = displayUnit(SENSORS[sensor].deviation, chosen);
  return analysis.axes
    .filter(({ channel }) => channel.startsWith(sensor))
    .map(({ channel, points }) => ({
      axis: channel.slice(-1) as AllanCurve['axis'],
      points: points.map(({ tauS, deviation, low, high, model }) => ({
        tauS,
        deviation: deviation / toSi,
        low: low / toSi,
        high: high / toSi,
        model: model / toSi,
      })),
    }));
}

/** The datasheet's white noise and bias instability as a curve; null where it says nothing. √(N²/τ + (0.664 B)²). */
export function datasheetCurve(
  figures: SensorFigures | null,
  sensor: Sensor,
  [fromS, toS]: readonly [number, number],
  chosen: DisplayUnits = {},
): { tauS: number; deviation: number }[] | null {
  const [white, wander] = SENSORS[sensor].figures;
  const n = figureOf(figures, sensor, white!.field);
  const b = figureOf(figures, sensor, wander!.field);
  if (n === null && b === null) return null;
  const plateau = (b ?? 0) * Math.sqrt((2 * Math.LN2) / Math.PI);
  const { toSi } = displayUnit(SENSORS[sensor].deviation, chosen);
  const steps = 40;
  return Array.from({ length: steps + 1 }, (_, i) => {
    const tauS = fromS * (toS / fromS) ** (i / steps);
    const deviation = Math.hypot((n ?? 0) / Math.sqrt(tauS), plateau);
    return { tauS, deviation: deviation / toSi };
  });
}
