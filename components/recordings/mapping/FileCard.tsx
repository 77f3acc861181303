import { useWatch, type Control } from 'react-hook-form';
import { StyleSheet, View } from 'react-native';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { Card } from '@/components/ui/Card';
import { Notice } from '@/components/ui/Notice';
import { space } from '@/constants/theme';
import type { FilePreview } from '@/shared/contracts/recordings';
import { Fold } from '@/components/ui/Fold';
import { columnParts } from './column-parts';
import { GnssPart, ReferencePart } from './FileParts';
import { GuessList, SURE } from './GuessList';
import { ImuPart } from './ImuPart';
import type { MapDraft } from './map-draft';
import { PreviewTable } from './PreviewTable';

export interface FileCardProps {
  preview: FilePreview;
  all: readonly FilePreview[];
  title: string;
  /** Something in its fields is still wrong. */
  fault: boolean;
  control: Control<MapDraft>;
}

/** One file: its first rows, what was guessed, and what its columns are. */
export function FileCard({ preview, all, title, fault, control }: FileCardProps) {
  const { role } = preview;
  const { wide } = useBreakpoint();
  const draft = useWatch({ control }) as MapDraft;
  const fields = fieldsOf(preview, all, control);
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
      {wide || role === 'imu' || isDoubtful(preview) ? (
        fields
      ) : fields ? (
        <Fold title={`All fields of the ${title}`} fault={fault}>
          <View style={styles.fields}>{fields}</View>
        </Fold>
      ) : null}
    </Card>
  );
}

function fieldsOf(preview: FilePreview, all: readonly FilePreview[], control: Control<MapDraft>) {
  const { headers } = preview;
  switch (preview.role) {
    case 'imu': {
      const twoFiles = all.some((one) => one.role === 'imu2');
      return <ImuPart control={control} headers={imuHeaders(preview, all)} twoFiles={twoFiles} />;
    }
    case 'gnss':
      return <GnssPart control={control} headers={headers} />;
    case 'reference':
      return <ReferencePart control={control} headers={headers} />;
    default:
      return null;
  }
}

/** On the phone the fields of a file that was understood wait behind a press. */
const isDoubtful = ({ missing, guesses = [] }: FilePreview) =>
  missing.length > 0 || guesses.some(({ confidence }) => confidence < SURE);

/** The sensors of an IMU may lie in two files; one form maps both. */
function imuHeaders({ headers }: FilePreview, all: readonly FilePreview[]): string[] {
  const second = all.find((one) => one.role === 'imu2')?.headers ?? [];
  return [...headers, ...second.filter((header) => !headers.includes(header))];
}

const styles = StyleSheet.create({
  file: { gap: space.xl, minWidth: 0, maxWidth: '100%' },
  fields: { gap: space.xl },
});
