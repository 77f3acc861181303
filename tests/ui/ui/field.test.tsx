import { fireEvent, screen } from '@testing-library/react-native';
import { Field } from '@/components/ui/Field';
import { renderAs } from '../render';

test('carries its unit in the label that is seen and in the one that is read', () => {
  renderAs(<Field label="Forward" unit="m" value="0.4" />);
  expect(screen.getByText('Forward (m)', { includeHiddenElements: true })).toBeOnTheScreen();
  expect(screen.getByLabelText('Forward, m')).toHaveDisplayValue('0.4');
});

test('shows the error beside the field and ties it to the field', () => {
  renderAs(<Field label="Name" value="" error="Give it a name." hint="As the team calls it." />);
  const error = screen.getByText('Give it a name.');
  const described = String(screen.getByLabelText('Name').props['aria-describedby']).split(' ');
  expect(described).toContain(error.props.nativeID);
  expect(screen.getByLabelText('Name').props['aria-invalid']).toBe(true);
});

test('hands on what is typed', () => {
  const change = jest.fn();
  renderAs(<Field label="Name" value="" onChangeText={change} />);
  fireEvent.changeText(screen.getByLabelText('Name'), 'Crawler 1');
  expect(change).toHaveBeenCalledWith('Crawler 1');
});
