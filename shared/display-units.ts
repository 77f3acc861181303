/** Which unit each quantity is shown in, as a person chose it; what was not chosen has its default. Pure. */
import { defaultUnit, QUANTITIES, type DisplayUnit, type Quantity } from './units';

/** Symbol of the unit of each quantity that was chosen. */
export type DisplayUnits = Partial<Record<Quantity, string>>;

/** Quantities whose unit a person may choose, in the order of the profile. */
export const CHOSEN_QUANTITIES = [
  'angleRandomWalk',
  'gyroBias',
  'rateRandomWalk',
  'velocityRandomWalk',
  'accelBias',
  'accelRandomWalk',
  'angle',
  'length',
  'speed',
] as const satisfies readonly Quantity[];
export type ChosenQuantity = (typeof CHOSEN_QUANTITIES)[number];

export const QUANTITY_NAMES: Record<ChosenQuantity, string> = {
  angleRandomWalk: 'Gyro white noise (ARW)',
  gyroBias: 'Angular rate and gyro bias',
  rateRandomWalk: 'Rate random walk',
  velocityRandomWalk: 'Accelerometer white noise (VRW)',
  accelBias: 'Acceleration and accelerometer bias',
  accelRandomWalk: 'Acceleration random walk',
  angle: 'Angles',
  length: 'Lengths',
  speed: 'Speeds',
};

/** All units of a quantity, its default first. */
export const unitsOf = (quantity: Quantity): readonly DisplayUnit[] => QUANTITIES[quantity];

/** The unit that `quantity` is shown in; a symbol that is not one of its units counts as not chosen. */
export const displayUnit = (quantity: Quantity, chosen: DisplayUnits = {}): DisplayUnit =>
  chosenUnit(quantity, chosen) ?? defaultUnit(quantity);

/** The unit that was chosen for `quantity`; null: none was, and a field may have its own. */
export function chosenUnit(quantity: Quantity, chosen: DisplayUnits): DisplayUnit | null {
  return unitsOf(quantity).find(({ symbol }) => symbol === chosen[quantity]) ?? null;
}

/** Symbol, and what a raw number is multiplied by to be shown; `siPerRaw`: what one of it is in SI. */
export function scaleOf(
  quantity: Quantity,
  chosen: DisplayUnits = {},
  siPerRaw = 1,
): { symbol: string; factor: number } {
  const { symbol, toSi } = displayUnit(quantity, chosen);
  return { symbol, factor: siPerRaw / toSi };
}
