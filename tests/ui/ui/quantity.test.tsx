import { screen } from '@testing-library/react-native';
import { Quantity } from '@/components/ui/Quantity';
import { renderAs } from '../render';

test('shows the value to three significant digits and never without its unit', () => {
  renderAs(<Quantity value={14.6213} unit="m" />);
  expect(screen.getByText(/^14\.6 m$/)).toBeOnTheScreen();
});

test('shows the change against the baseline with its sign', () => {
  renderAs(<Quantity value={14.6} unit="m" baseline={17.7} baselineName="version 2" />);
  expect(screen.getByText('−3.10 against version 2')).toBeOnTheScreen();
});

test('shows an uncertainty with ±', () => {
  renderAs(<Quantity value={0.32} unit="°/√h" uncertainty={0.041} />);
  expect(screen.getByText(/0\.320 ± 0\.041/)).toBeOnTheScreen();
});

test.each([null, Number.NaN])('shows a dash where there is no value (%s)', (value) => {
  renderAs(<Quantity value={value} unit="m" baseline={3} />);
  expect(screen.getByText(/–/)).toBeOnTheScreen();
  expect(screen.queryByText(/against/)).toBeNull();
});
