import { useWatch, type Control } from 'react-hook-form';
import { StyleSheet } from 'react-native';
import { Card } from '@/components/ui/Card';
import { Notice } from '@/components/ui/Notice';
import { space } from '@/constants/theme';
import type { FilePreview } from '@/shared/contracts/recordings';
import { columnParts } from './column-parts';
import { GnssPart, ReferencePart } from './FileParts';
import { GuessList } from './GuessList';
import { ImuPart } from './ImuPart';
import type { MapDraft } from './map-draft';
import { PreviewTable } from './PreviewTable';

export interface FileCardProps {
  preview: FilePreview;
  all: readonly FilePreview[];
  title: string;
  control: Control<MapDraft>;
}

/** One file: its first rows, what was guessed, and what its columns are. */
export function FileCard({ preview, all, title, control }: FileCardProps) {
  const { role } = preview;
  const draft = useWatch({ control }) as MapDraft;
  const aidsIn = all.some((one) => one.role === 'aids') ? 'aids' : 'imu';
  return (
    <Card title={title} style={styles.file}>
      {preview.missing.length > 0 ? (
        <Notice tone="ochre" title="Not found in the headers">
          {`${preview.missing.join(', ')}.`}
        </Notice>
      ) : null}
      <PreviewTable preview={preview} title={title} parts={columnParts(draft, role, aidsIn)} />
      <GuessList guesses={preview.guesses ?? []} />
      {role === 'imu' ? (
        <ImuPart
          control={control}
          headers={imuHeaders(preview, all)}
          twoFiles={all.some((one) => one.role === 'imu2')}
        />
      ) : null}
      {role === 'gnss' ? <GnssPart control={control} headers={preview.headers} /> : null}
      {role === 'reference' ? <ReferencePart control={control} headers={preview.headers} /> : null}
    </Card>
  );
}

/** The sensors of an IMU may lie in two files; one form maps both. */
function imuHeaders({ headers }: FilePreview, all: readonly FilePreview[]): string[] {
  const second = all.find((one) => one.role === 'imu2')?.headers ?? [];
  return [...headers, ...second.filter((header) => !headers.includes(header))];
}

const styles = StyleSheet.create({ file: { gap: space.xl, minWidth: 0, maxWidth: '100%' } });
