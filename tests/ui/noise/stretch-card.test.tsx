import { fireEvent, screen } from '@testing-library/react-native';
import { StretchCard } from '@/components/noise/StretchCard';
import { renderAs } from '../render';
import { recordingOf } from '../recordings/fixtures';

const strip = {
  startS: 0,
  endS: 1240,
  speedMPerS: [0, 1],
  gnssFixes: [10, 10],
  clippedS: [],
  gapsS: [],
};
const found = [[600, 1200], [0, 240]] as const; // prettier-ignore
const recording = recordingOf({ strip });

function show(chosen: readonly [number, number] | null, onChoose = jest.fn()) {
  renderAs(
    <StretchCard recording={recording} found={found} chosen={chosen} analysis={null} onChoose={onChoose} />,
  );
  return onChoose;
}

it('starts from the longest stretch that was found', () => {
  show(null);
  expect(screen.getByLabelText('From, s')).toHaveDisplayValue('600');
  expect(screen.getByLabelText('To, s')).toHaveDisplayValue('1200');
});

it('takes typed times, also as minutes, and says what it cannot take', () => {
  const onChoose = show([0, 240]);
  fireEvent.changeText(screen.getByLabelText('From, s'), '5');
  fireEvent.changeText(screen.getByLabelText('To, s'), '3:30.5');
  fireEvent.press(screen.getByRole('button', { name: 'Analyse' }));
  expect(onChoose).toHaveBeenCalledWith([5, 210.5]);
  fireEvent.changeText(screen.getByLabelText('To, s'), '4');
  fireEvent.press(screen.getByRole('button', { name: 'Analyse' }));
  expect(onChoose).toHaveBeenCalledTimes(1);
  expect(screen.getByText(/the second after the first/)).toBeTruthy();
});
