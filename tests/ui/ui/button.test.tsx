import { fireEvent, screen } from '@testing-library/react-native';
import { Button } from '@/components/ui/Button';
import { renderAs } from '../render';

test('takes a press', () => {
  const press = jest.fn();
  renderAs(<Button label="Save" onPress={press} />);
  fireEvent.press(screen.getByRole('button', { name: 'Save' }));
  expect(press).toHaveBeenCalledTimes(1);
});

test('takes no press while busy and says so', () => {
  const press = jest.fn();
  renderAs(<Button label="Save" busy onPress={press} />);
  const button = screen.getByRole('button', { name: 'Save', busy: true });
  fireEvent.press(button);
  expect(press).not.toHaveBeenCalled();
});

test('says why it cannot be pressed, and cannot', () => {
  const press = jest.fn();
  renderAs(<Button label="Release" disabled reason="An approver releases." onPress={press} />);
  const button = screen.getByRole('button', { name: 'Release. An approver releases.', disabled: true });
  fireEvent.press(button);
  expect(press).not.toHaveBeenCalled();
});

test('an icon alone keeps its name for the screen reader', () => {
  renderAs(<Button label="Delete" icon="delete" iconOnly />);
  expect(screen.getByRole('button', { name: 'Delete' })).toBeOnTheScreen();
  expect(screen.queryByText('Delete')).toBeNull();
});
