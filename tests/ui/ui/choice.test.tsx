import { fireEvent, screen } from '@testing-library/react-native';
import { Choice } from '@/components/ui/Choice';
import { renderAs } from '../render';

const OPTIONS = [
  { value: 'paper', label: 'Paper' },
  { value: 'night', label: 'Night' },
] as const;

test('segments tell which one is chosen and choose another', () => {
  const change = jest.fn();
  renderAs(<Choice label="Theme" shape="segments" options={OPTIONS} value="paper" onChange={change} />);
  expect(screen.getByRole('radio', { name: 'Paper', checked: true })).toBeOnTheScreen();
  fireEvent.press(screen.getByRole('radio', { name: 'Night' }));
  expect(change).toHaveBeenCalledWith('night');
});

test('a select chooses by value and shows its error', () => {
  const change = jest.fn();
  renderAs(
    <Choice
      label="Time column"
      options={OPTIONS}
      value=""
      placeholder="Choose a column"
      onChange={change}
      error="Choose a column."
    />,
  );
  fireEvent(screen.getByLabelText('Time column'), 'change', { target: { value: 'night' } });
  expect(change).toHaveBeenCalledWith('night');
  expect(screen.getByText('Choose a column.')).toBeOnTheScreen();
});
