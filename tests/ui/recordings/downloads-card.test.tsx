import { screen } from '@testing-library/react-native';
import { DownloadsCard } from '@/components/recordings/DownloadsCard';
import { renderAs } from '../render';
import { recordingOf } from './fixtures';

const names = () => screen.getAllByRole('link').map((link) => String(link.props['aria-label']));

test('offers every channel in both formats, and the health report', () => {
  renderAs(<DownloadsCard recording={recordingOf({ hasReference: true })} />, 'viewer');
  const channels = ['IMU', 'GNSS', 'Reference'].flatMap((of) => [`${of} as Arrow`, `${of} as CSV`]);
  expect(names()).toEqual([...channels, 'Health report as JSON']);
});

test('has no reference where the recording has none, and leads to the files of this recording', () => {
  const recording = recordingOf({ hasReference: false });
  renderAs(<DownloadsCard recording={recording} />, 'viewer');
  expect(names()).not.toContain('Reference as CSV');
  const csv = screen.getByRole('link', { name: 'GNSS as CSV' });
  expect(csv.props.href).toContain(`/recordings/${recording.id}/decoded.csv?channel=gnss`);
  expect(csv.props.hrefAttrs).toEqual({ download: true });
});
