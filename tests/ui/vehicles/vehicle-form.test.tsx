import { fireEvent, screen, waitFor } from '@testing-library/react-native';
import { VehicleForm } from '@/components/vehicles/VehicleForm';
import { IDENTITY_AXES, type Vehicle } from '@/shared/contracts/vehicles';
import { renderAs } from '../render';

const CRAWLER: Vehicle = {
  id: '4f0c8a52-0f4e-4a1c-9a55-3d1f0f3b7e10',
  name: 'Crawler 1',
  kind: 'marine',
  leverArmM: [0.42, 0.05, -0.88],
  axes: IDENTITY_AXES,
  sensor: null,
  notes: '',
  createdAt: '2026-11-03T08:00:00Z',
  recordingCount: 2,
};
const type = (label: string, text: string) => fireEvent.changeText(screen.getByLabelText(label), text);
const save = () => fireEvent.press(screen.getByRole('button', { name: 'Save' }));

test('shows the lever arm with its unit', () => {
  renderAs(<VehicleForm vehicle={CRAWLER} saveLabel="Save" onSave={() => Promise.resolve()} />);
  expect(screen.getByLabelText('Down, m')).toHaveDisplayValue('-0.88');
});

test('takes a comma and a true minus, and saves numbers', async () => {
  const saved = jest.fn(() => Promise.resolve());
  renderAs(<VehicleForm vehicle={CRAWLER} saveLabel="Save" onSave={saved} />);
  type('Down, m', '−1,05');
  save();
  await waitFor(() =>
    expect(saved).toHaveBeenCalledWith(expect.objectContaining({ leverArmM: [0.42, 0.05, -1.05] })),
  );
});

test('text where a number belongs is named, kept, and not saved', async () => {
  const saved = jest.fn();
  renderAs(<VehicleForm vehicle={CRAWLER} saveLabel="Save" onSave={saved} />);
  type('Right, m', 'a bit');
  save();
  expect(await screen.findByText(/Write a number/)).toBeOnTheScreen();
  expect(screen.getByLabelText('Right, m')).toHaveDisplayValue('a bit');
  expect(saved).not.toHaveBeenCalled();
});

test('another forward axis moves the others with it', async () => {
  const saved = jest.fn(() => Promise.resolve());
  renderAs(<VehicleForm vehicle={CRAWLER} saveLabel="Save" onSave={saved} />);
  fireEvent(screen.getByLabelText('Points down'), 'change', { target: { value: '-z' } });
  expect(screen.getByText(/x forward, y left, z up/)).toBeOnTheScreen();
  save();
  await waitFor(() =>
    expect(saved).toHaveBeenCalledWith(
      expect.objectContaining({ axes: { forward: '+x', right: '-y', down: '-z' } }),
    ),
  );
});

test('read-only: everything is shown, nothing can be saved', () => {
  renderAs(<VehicleForm vehicle={CRAWLER} saveLabel="Save" readOnly onSave={() => Promise.resolve()} />);
  expect(screen.queryByRole('button', { name: 'Save' })).toBeNull();
  expect(screen.getByLabelText('Name').props.editable).toBe(false);
});
