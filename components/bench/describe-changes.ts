/** What differs between two parameter sets, in lines for people. Pure. */
import type { Parameters } from '@/shared/contracts/parameters';
import { formatNumber } from '@/shared/format';
import { defaultUnit, toDisplay } from '@/shared/units';
import { differences, readPath, type ParameterValue } from './parameter-path';
import { GROUP_TITLES, SLIDERS } from './parameter-specs';

/** "Gyro white noise (ARW): 0.299 → 0.32 °/√h". */
export function describeChanges(from: Parameters, to: Parameters): string[] {
  return differences(from, to).map(({ path, value }) => {
    const spec = SLIDERS.find((one) => one.path === path);
    const before = readPath(from, path);
    if (!spec) return `${path}: ${plain(before)} → ${plain(value)}`;
    const unit = defaultUnit(spec.quantity);
    const shown = (one: ParameterValue) =>
      typeof one === 'number' ? formatNumber(toDisplay(one, unit)) : plain(one);
    const label = `${spec.label[0]!.toLowerCase()}${spec.label.slice(1)}`;
    return `${GROUP_TITLES[spec.group]} ${label}: ${shown(before)} → ${shown(value)} ${unit.symbol}`;
  });
}

const plain = (value: ParameterValue): string =>
  value === null ? 'not set' : Array.isArray(value) ? value.join(', ') : String(value);
