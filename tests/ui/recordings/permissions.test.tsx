import { screen } from '@testing-library/react-native';
import { UploadButton } from '@/components/recordings/UploadButton';
import { NotesCard } from '@/components/recordings/NotesCard';
import { roleSchema, can } from '@/shared/contracts/roles';
import { renderAs } from '../render';
import { recordingOf } from './fixtures';

test.each(roleSchema.options)('%s sees the upload button only with the permission', (role) => {
  renderAs(<UploadButton />, role);
  expect(screen.queryAllByRole('button', { name: 'Upload' })).toHaveLength(
    can(role, 'recording:write') ? 1 : 0,
  );
});

test('a viewer reads the notes and cannot change them', () => {
  renderAs(<NotesCard recording={recordingOf({ notes: 'Wind from the west.' })} />, 'viewer');
  expect(screen.getByText('Wind from the west.')).toBeOnTheScreen();
  expect(screen.queryByRole('button', { name: 'Edit notes' })).toBeNull();
});
