/** A parameter that is typed, switched or chosen rather than slid: its name of the trade, its unit, what it hangs on. */
import { chosenUnit, unitsOf, type DisplayUnits } from '@/shared/display-units';
import { defaultUnit, type DisplayUnit, type Quantity } from '@/shared/units';

export type FieldGroup =
  | 'gyro'
  | 'accel'
  | 'gnss'
  | 'gate'
  | 'initial'
  | 'mechanisation'
  | 'clipping'
  | 'stops'
  | 'vehicle'
  | 'sensors'
  | 'states';

export const FIELD_GROUPS: Record<FieldGroup, string> = {
  gyro: 'Gyro',
  accel: 'Accelerometer',
  gnss: 'GNSS',
  gate: 'Gate',
  initial: 'Start',
  mechanisation: 'Mechanisation',
  clipping: 'Clipping',
  stops: 'Stops',
  vehicle: 'Vehicle constraint',
  sensors: 'Other sensors',
  states: 'Further states',
};

export interface ParameterField {
  path: string;
  group: FieldGroup;
  label: string;
  quantity?: Quantity;
  /** Symbol of the quantity's unit that is shown; left out: its default. Without a quantity: the unit as the contract has it. */
  unit?: string;
  /** Words for the values of a choice. */
  words?: Readonly<Record<string, string>>;
  hint?: string;
  /** What counts while nothing is set. */
  unset?: string;
  /** Bounds on what may be typed where the contract sets none, SI. */
  range?: { low: number; high: number };
  /** Switches of which at least one must be on for this to count. */
  needs?: readonly string[];
}

/** The unit that a field is shown in: the one that was chosen for its quantity, else its own; null: it has none. */
export function fieldUnit({ quantity, unit }: ParameterField, chosen: DisplayUnits = {}): DisplayUnit | null {
  if (!quantity) return unit ? { symbol: unit, toSi: 1 } : null;
  return (
    chosenUnit(quantity, chosen) ??
    unitsOf(quantity).find((one) => one.symbol === unit) ??
    defaultUnit(quantity)
  );
}
