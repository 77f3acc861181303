import { fireEvent, screen } from '@testing-library/react-native';
import { ParameterPanel } from '@/components/bench/ParameterPanel';
import { describeChanges } from '@/components/bench/describe-changes';
import type { ParameterGroup } from '@/shared/parameters/parameter-specs';
import { defaultParameters } from '@/shared/contracts/parameters';
import { RAD_PER_DEG } from '@/shared/units';
import { renderAs } from '../render';
import { BenchStand, type BenchSeen } from './stand';

let seen: BenchSeen;
const show = (group?: ParameterGroup, locked?: string) =>
  renderAs(
    <BenchStand locked={locked} onBench={(bench) => (seen = bench)}>
      {(bench) => <ParameterPanel bench={bench} group={group} />}
    </BenchStand>,
  );
const aids = () => seen.config.parameters.aids;
const flip = (label: string) => fireEvent.press(screen.getByRole('switch', { name: label }));
function type(label: string, text: string) {
  const field = screen.getByLabelText(label);
  fireEvent.changeText(field, text);
  fireEvent(field, 'blur');
}

test('the aids are folded away, and a line says which are on', () => {
  show();
  expect(screen.getByText('On: Clipping')).toBeOnTheScreen();
  expect(screen.queryByRole('switch', { name: 'Zero-velocity update' })).toBeNull();
  fireEvent.press(screen.getByRole('button', { name: 'More Aids settings' }));
  flip('Zero-velocity update');
  expect(screen.getByText('On: Clipping, stops')).toBeOnTheScreen();
});

test('an aid shows its values only while it is on', () => {
  show('aids');
  expect(screen.queryByLabelText('Zero-velocity σ, m/s')).toBeNull();
  expect(screen.queryByLabelText('Stop detection window, s')).toBeNull();
  flip('Zero-velocity update');
  expect(aids().zeroVelocity.enabled).toBe(true);
  expect(screen.getByLabelText('Zero-velocity σ, m/s')).toHaveDisplayValue('0.03');
  expect(screen.getByLabelText('Stop detection window, s')).toBeOnTheScreen();
  expect(screen.queryByLabelText('Sideways velocity σ, m/s')).toBeNull();
  flip('Zero-velocity update');
  expect(screen.queryByLabelText('Zero-velocity σ, m/s')).toBeNull();
});

test('a typed number is in the unit shown, or in the one typed with it', () => {
  show('aids');
  flip('Zero-rotation update');
  type('Gyro spread at a stop below, °/s', '2');
  expect(aids().stopDetection.gyroSpreadRadPerS).toBeCloseTo(2 * RAD_PER_DEG, 12);
  type('Zero-rotation σ, °/h', '0.0002 rad/s');
  expect(aids().zeroRotation.sigmaRadPerS).toBeCloseTo(2e-4, 12);
});

test('what cannot be is said with its bounds, stays in the field, and changes nothing', () => {
  show('aids');
  flip('Zero-velocity update');
  type('Zero-velocity σ, m/s', '50');
  expect(screen.getByText('Between 0.000100 and 10.0 m/s.')).toBeOnTheScreen();
  expect(screen.getByLabelText('Zero-velocity σ, m/s')).toHaveDisplayValue('50');
  expect(aids().zeroVelocity.sigmaMPerS).toBe(0.03);
});

test('a range may be left out, and then the data tell', () => {
  show('aids');
  const field = 'Gyro range ±, °/s';
  type(field, '250');
  expect(seen.config.parameters.clipping.gyroRangeRadPerS).toBeCloseTo(250 * RAD_PER_DEG, 10);
  type(field, '');
  expect(seen.config.parameters.clipping.gyroRangeRadPerS).toBeUndefined();
});

test('leaving a field as it was changes nothing of its last digits', () => {
  show('aids');
  flip('Zero-rotation update');
  expect(screen.getByLabelText('Zero-rotation σ, °/h')).toHaveDisplayValue('20.63');
  type('Zero-rotation σ, °/h', '20.63');
  expect(aids().zeroRotation.sigmaRadPerS).toBe(1e-4);
});

test('each run can be smoothed and its error split', () => {
  show('aids');
  flip('Smooth too');
  flip('Error budget');
  expect(seen.config.options).toEqual({ smooth: true, errorBudget: true });
});

test('who may only read sees what is set and changes nothing', () => {
  show('aids', 'Your role reads.');
  expect(screen.getByRole('switch', { name: 'Zero-velocity update' })).toBeDisabled();
  flip('Zero-velocity update');
  expect(aids().zeroVelocity.enabled).toBe(false);
});

test('changes are named in words', () => {
  show('aids');
  flip('Non-holonomic constraint');
  type('Sideways velocity σ, m/s', '0,5');
  type('Gyro range ±, °/s', '250');
  expect(describeChanges(defaultParameters(), seen.config.parameters)).toEqual([
    'Vehicle constraint, non-holonomic constraint: off → on',
    'Vehicle constraint, sideways velocity σ: 0.200 → 0.500 m/s',
    'Clipping, gyro range ±: from flat tops → 250 °/s',
  ]);
});
