/** Units at the edges: exact factors to SI, and the display units of each quantity. Inside the engine all is SI and radians. */

export const RAD_PER_DEG = Math.PI / 180;
/** Standard gravity, m/s², exact by definition (3rd CGPM, 1901). */
export const STANDARD_GRAVITY_M_S2 = 9.80665;
export const KNOT_M_S = 1852 / 3600;
/** International foot, m, exact by definition. */
export const FOOT_M = 0.3048;

export const degToRad = (deg: number) => deg * RAD_PER_DEG;
export const radToDeg = (rad: number) => rad / RAD_PER_DEG;

/** A display unit: `value in SI = value shown × toSi`. */
export interface DisplayUnit {
  symbol: string;
  toSi: number;
}

/** The first unit of each quantity is its default on screen. */
export const QUANTITIES = {
  angleRandomWalk: [
    { symbol: '°/√h', toSi: RAD_PER_DEG / 60 },
    { symbol: '°/s/√Hz', toSi: RAD_PER_DEG },
    { symbol: 'rad/√s', toSi: 1 },
  ],
  velocityRandomWalk: [
    { symbol: 'm/s/√h', toSi: 1 / 60 },
    { symbol: 'µg/√Hz', toSi: STANDARD_GRAVITY_M_S2 * 1e-6 },
    { symbol: 'm/s/√s', toSi: 1 },
  ],
  rateRandomWalk: [
    { symbol: '°/h/√h', toSi: RAD_PER_DEG / 3600 / 60 },
    { symbol: 'rad/s/√s', toSi: 1 },
  ],
  accelRandomWalk: [
    { symbol: 'mg/√h', toSi: (STANDARD_GRAVITY_M_S2 * 1e-3) / 60 },
    { symbol: 'm/s²/√s', toSi: 1 },
  ],
  gyroBias: [
    { symbol: '°/h', toSi: RAD_PER_DEG / 3600 },
    { symbol: '°/s', toSi: RAD_PER_DEG },
    { symbol: 'rad/s', toSi: 1 },
  ],
  accelBias: [
    { symbol: 'mg', toSi: STANDARD_GRAVITY_M_S2 * 1e-3 },
    { symbol: 'm/s²', toSi: 1 },
  ],
  length: [
    { symbol: 'm', toSi: 1 },
    { symbol: 'ft', toSi: FOOT_M },
  ],
  speed: [
    { symbol: 'm/s', toSi: 1 },
    { symbol: 'km/h', toSi: 1 / 3.6 },
    { symbol: 'kn', toSi: KNOT_M_S },
  ],
  angle: [
    { symbol: '°', toSi: RAD_PER_DEG },
    { symbol: 'mrad', toSi: 1e-3 },
    { symbol: 'rad', toSi: 1 },
  ],
  time: [
    { symbol: 's', toSi: 1 },
    { symbol: 'min', toSi: 60 },
    { symbol: 'h', toSi: 3600 },
  ],
  factor: [{ symbol: '×', toSi: 1 }],
  percent: [{ symbol: '%', toSi: 0.01 }],
} as const satisfies Record<string, readonly DisplayUnit[]>;
export type Quantity = keyof typeof QUANTITIES;

export const defaultUnit = (quantity: Quantity): DisplayUnit => QUANTITIES[quantity][0];
export const toDisplay = (si: number, unit: DisplayUnit) => si / unit.toSi;
export const fromDisplay = (shown: number, unit: DisplayUnit) => shown * unit.toSi;
