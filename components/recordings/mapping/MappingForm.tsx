import { zodResolver } from '@hookform/resolvers/zod';
import { useForm, useWatch, type Control } from 'react-hook-form';
import { StyleSheet, View } from 'react-native';
import { FormProblem } from '@/components/forms/FormProblem';
import { showProblem } from '@/components/forms/problem';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { Notice } from '@/components/ui/Notice';
import { space } from '@/constants/theme';
import type { ChannelMap, FilePreview, FileRole, Recording } from '@/shared/contracts/recordings';
import { draftFromMap } from './draft-from-map';
import { GnssPart, ReferencePart } from './FileParts';
import { ImuPart } from './ImuPart';
import { mapDraftSchema, type MapDraft } from './map-draft';
import { columnParts, mapFromDraft } from './map-from-draft';
import type { PartProps } from './parts';
import { PreviewTable } from './PreviewTable';
import { withUnshown } from './unshown-fields';

export interface MappingFormProps {
  recording: Pick<Recording, 'channelMap' | 'previews'>;
  /** Sends the map; a refusal is thrown. */
  onSubmit: (map: ChannelMap) => Promise<unknown>;
}

/** A card a file: what its columns are, under its first rows. */
export function MappingForm({ recording, onSubmit }: MappingFormProps) {
  const { control, handleSubmit, setError, formState } = useForm<MapDraft>({
    resolver: zodResolver(mapDraftSchema),
    defaultValues: draftFromMap(recording),
  });
  const submit = handleSubmit(async (draft) => {
    try {
      await onSubmit(withUnshown(mapFromDraft(draft), recording.channelMap));
    } catch (error) {
      showProblem(error, [], setError);
    }
  });
  const faults = Object.keys(formState.errors).filter((key) => key !== 'root') as FileRole[];
  return (
    <View style={{ gap: space.l }}>
      <View style={styles.files}>
        {recording.previews.map((preview) => (
          <FileCard
            key={preview.role}
            preview={preview}
            headers={headersFor(preview, recording.previews)}
            control={control}
          />
        ))}
      </View>
      <FormProblem title="The map was not taken" message={formState.errors.root?.message} />
      {faults.length > 0 ? (
        <Notice tone="vermilion" urgent title="Something is still to be said">
          {`Look for the marked fields of the ${faults.map((role) => TITLES[role]).join(' and the ')}.`}
        </Notice>
      ) : null}
      <View style={{ flexDirection: 'row', justifyContent: 'flex-end' }}>
        <Button
          label="Use this map and decode"
          kind="primary"
          icon="check"
          busy={formState.isSubmitting}
          onPress={() => void submit()}
        />
      </View>
    </View>
  );
}

interface FileCardProps {
  preview: FilePreview;
  /** Columns to choose from. */
  headers: readonly string[];
  control: Control<MapDraft>;
}

function FileCard({ preview, headers, control }: FileCardProps) {
  const draft = useWatch({ control }) as MapDraft;
  const Part = PARTS[preview.role];
  return (
    <Card title={TITLES[preview.role]} style={styles.file}>
      {preview.missing.length > 0 ? (
        <Notice tone="ochre" title="Not found in the headers">
          {`${preview.missing.join(', ')}.`}
        </Notice>
      ) : null}
      <PreviewTable preview={preview} parts={columnParts(draft, preview.role)} />
      {Part ? <Part control={control} headers={headers} /> : null}
    </Card>
  );
}

const styles = StyleSheet.create({
  files: { flexDirection: 'row', flexWrap: 'wrap', gap: space.l, alignItems: 'flex-start' },
  file: { flexGrow: 1, flexShrink: 1, flexBasis: 520, minWidth: 0, maxWidth: '100%', gap: space.xl },
});

/** The sensors of an IMU may lie in two files; one form maps both. */
const headersFor = ({ role, headers }: FilePreview, all: readonly FilePreview[]) =>
  role === 'imu'
    ? [
        ...headers,
        ...(all.find((one) => one.role === 'imu2')?.headers ?? []).filter(
          (header) => !headers.includes(header),
        ),
      ]
    : headers;

const PARTS: Partial<Record<FileRole, (props: PartProps) => React.JSX.Element>> = {
  imu: ImuPart,
  gnss: GnssPart,
  reference: ReferencePart,
};
const TITLES: Record<FileRole, string> = {
  imu: 'IMU file',
  gnss: 'GNSS file',
  reference: 'Reference file',
  imu2: 'Second IMU file',
  aids: 'Other sensors',
};
