import { fireEvent, screen } from '@testing-library/react-native';
import { HealthCard } from '@/components/recordings/HealthCard';
import { renderAs } from '../render';
import { recordingOf } from './fixtures';

const health = recordingOf().health!;

test('the verdict first, then rates with their units and each finding with its remedy', () => {
  renderAs(<HealthCard health={health} />);
  expect(screen.getByRole('heading', { name: 'With care' })).toBeOnTheScreen();
  expect(screen.getByText(/^100 Hz$/)).toBeOnTheScreen();
  expect(screen.getByText(/^40\.0 ms$/)).toBeOnTheScreen();
  expect(screen.getByText('Mount it softer or take a wider range.')).toBeOnTheScreen();
});

test('a finding leads to its time on the plots', () => {
  const show = jest.fn();
  renderAs(<HealthCard health={health} onShow={show} />);
  fireEvent.press(screen.getByRole('button', { name: /Show on the plots/ }));
  expect(show).toHaveBeenCalledWith([696, 696.04]);
});

test('a verdict’s own word is not said twice', () => {
  renderAs(<HealthCard health={{ ...health, verdict: 'usable', sentence: 'Usable.' }} />);
  expect(screen.getAllByText(/usable/i)).toHaveLength(1);
});

test.each([
  ['with-care', 'Usable with care. The clock is 40 ms late.', 'The clock is 40 ms late.'],
  ['not-usable', 'Not usable as it is. The gyros are stuck.', 'The gyros are stuck.'],
  ['with-care', 'Usable, but look at the clipping.', 'Usable, but look at the clipping.'],
] as const)('%s: “%s” stands as “%s” under its heading', (verdict, sentence, left) => {
  renderAs(<HealthCard health={{ ...health, verdict, sentence, findings: [] }} />);
  expect(screen.getByText(left)).toBeOnTheScreen();
});
