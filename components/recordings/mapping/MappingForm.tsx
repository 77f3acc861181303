import { zodResolver } from '@hookform/resolvers/zod';
import { useRef, useState } from 'react';
import { useForm } from 'react-hook-form';
import { StyleSheet, View } from 'react-native';
import { FormProblem } from '@/components/forms/FormProblem';
import { showProblem } from '@/components/forms/problem';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { Notice } from '@/components/ui/Notice';
import { space } from '@/constants/theme';
import type { ChannelMap, Recording } from '@/shared/contracts/recordings';
import { Fold } from '@/components/ui/Fold';
import { AidsPart } from './AidsPart';
import { draftFromMap } from './draft-from-map';
import { FileCard } from './FileCard';
import { FILE_TITLES, titleOf } from './file-titles';
import { mapDraftSchema, type MapDraft } from './map-draft';
import { mapFromDraft } from './map-from-draft';
import { PreviewPane } from './PreviewPane';
import { SaveTemplateDialog } from './SaveTemplateDialog';
import { SubmitBar } from './SubmitBar';
import { TakenNote } from './TakenNote';
import { TakeOver } from './TakeOver';
import { useDraftPreview } from './use-draft-preview';
import { useTake } from './use-take';

export interface MappingFormProps {
  recording: Pick<Recording, 'id' | 'channelMap' | 'previews' | 'files' | 'vehicleId' | 'vehicleName'>;
  /** Sends the map; a refusal is thrown. */
  onSubmit: (map: ChannelMap) => Promise<unknown>;
}

/** A card a file, and beside them (below, on the phone) what the map makes of the first rows. */
export function MappingForm({ recording, onSubmit }: MappingFormProps) {
  const { previews, files } = recording;
  const { extraWide } = useBreakpoint();
  const pane = useRef<View>(null);
  const { control, handleSubmit, setError, setValue, getValues, formState } = useForm<MapDraft>({
    resolver: zodResolver(mapDraftSchema),
    defaultValues: draftFromMap(recording),
  });
  const { state, incomplete } = useDraftPreview(recording.id, control);
  const { take, note } = useTake(previews, getValues, (draft) => {
    for (const role of Object.keys(draft) as (keyof MapDraft)[])
      setValue(role, draft[role], { shouldDirty: true, shouldValidate: formState.isSubmitted });
  });
  const submit = handleSubmit(async (draft) => {
    try {
      await onSubmit(mapFromDraft(draft));
    } catch (error) {
      showProblem(error, [], setError);
    }
  });
  const [template, setTemplate] = useState<ChannelMap | null>(null);
  const keep = handleSubmit((draft) => setTemplate(mapFromDraft(draft)));
  const faults = Object.keys(formState.errors).filter((key) => key !== 'root') as (keyof MapDraft)[];
  const aidsKnown = Object.keys(recording.channelMap?.aids ?? {}).length > 0;
  return (
    <View style={extraWide ? styles.columns : styles.stack}>
      <View style={[styles.stack, extraWide ? styles.main : null]}>
        <TakeOver recording={recording} previews={previews} onTake={take} />
        {previews.map((preview) => (
          <FileCard
            key={preview.role}
            preview={preview}
            all={previews}
            title={titleOf(preview.role, files)}
            fault={faults.includes(preview.role as keyof MapDraft)}
            control={control}
          />
        ))}
        <Card>
          <Fold
            title="Barometer, heading, odometer"
            open={aidsKnown || previews.some(({ role }) => role === 'aids')}
            fault={faults.includes('aids')}
          >
            <AidsPart control={control} previews={previews} titles={FILE_TITLES} />
          </Fold>
        </Card>
        <View style={styles.keep}>
          <Button label="Save as template" icon="copy" onPress={() => void keep()} />
        </View>
        {template ? (
          <SaveTemplateDialog recording={recording} channelMap={template} onClose={() => setTemplate(null)} />
        ) : null}
      </View>
      <View ref={pane} style={[styles.stack, extraWide ? [styles.side, BESIDE] : null]}>
        <PreviewPane state={state} incomplete={incomplete} onTake={take} />
        {extraWide ? <TakenNote {...note} /> : null}
        <FormProblem title="The map was not taken" message={formState.errors.root?.message} />
        {faults.length > 0 ? (
          <Notice tone="vermilion" urgent title="Something is still to be said">
            {`Look for the marked fields of the ${faults.map((role) => FILE_TITLES[role]).join(' and the ')}.`}
          </Notice>
        ) : null}
        {extraWide ? <SubmitBar {...bar()} /> : null}
      </View>
      {extraWide ? null : (
        <SubmitBar {...bar()}>
          <TakenNote {...note} />
        </SubmitBar>
      )}
    </View>
  );

  function bar() {
    return {
      busy: formState.isSubmitting,
      preview: state.preview,
      computing: state.computing && !incomplete,
      onSubmit: () => void submit(),
      onLook: () => {
        const element = pane.current as unknown;
        if (typeof HTMLElement !== 'undefined' && element instanceof HTMLElement)
          element.scrollIntoView({ block: 'start' });
      },
    };
  }
}

/** Beside the form the preview stays in sight; React Native's types do not know it. */
const BESIDE: object = {
  position: 'sticky',
  top: space.l,
  maxHeight: 'calc(100vh - 32px)',
  overflowY: 'auto',
};

const styles = StyleSheet.create({
  columns: { flexDirection: 'row', gap: space.l, alignItems: 'flex-start' },
  stack: { gap: space.l },
  keep: { flexDirection: 'row' },
  main: { flex: 3, minWidth: 0 },
  side: { flex: 2, minWidth: 0 },
});
