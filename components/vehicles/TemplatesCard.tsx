import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { ConfirmDialog } from '@/components/ui/Dialog';
import { ErrorState, messageOf } from '@/components/ui/ErrorState';
import { Notice } from '@/components/ui/Notice';
import { Skeleton } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { useToast } from '@/components/ui/ToastProvider';
import { formatDay } from '@/components/ui/format-day';
import { hairline, space } from '@/constants/theme';
import { useDeleteMapTemplate, useMapTemplates } from '@/hooks/map-templates';
import type { MapTemplate } from '@/shared/contracts/map-templates';
import type { Vehicle } from '@/shared/contracts/vehicles';

/** The channel maps that are kept with a vehicle. */
export function TemplatesCard({ vehicle, readOnly }: { vehicle: Vehicle; readOnly: boolean }) {
  const templates = useMapTemplates(vehicle.id);
  const [deleting, setDeleting] = useState<MapTemplate | null>(null);
  return (
    <Card title="Templates of the channel map">
      {templates.isPending ? <Skeleton height={44} /> : null}
      {templates.isError ? (
        <ErrorState
          title="The templates cannot be shown"
          error={templates.error}
          onRetry={() => void templates.refetch()}
        />
      ) : null}
      {templates.data?.length === 0 ? (
        <Text variant="label" tone="soft">
          None yet. When the columns of one of its recordings are mapped, “Save as template” keeps the map
          here for the next.
        </Text>
      ) : null}
      {templates.data?.map((template) => (
        <Row
          key={template.id}
          template={template}
          onDelete={readOnly ? undefined : () => setDeleting(template)}
        />
      ))}
      {deleting ? (
        <DeleteTemplate vehicle={vehicle} template={deleting} onClose={() => setDeleting(null)} />
      ) : null}
    </Card>
  );
}

function Row({ template, onDelete }: { template: MapTemplate; onDelete?: () => void }) {
  const { palette } = useTheme();
  const parts = (Object.keys(PARTS) as (keyof typeof PARTS)[]).filter((part) => template.channelMap[part]);
  return (
    <View style={[styles.row, { borderTopColor: palette.rule }]}>
      <View style={styles.words}>
        <Text strong>{template.name}</Text>
        <Text variant="label" tone="soft">
          {`${parts.map((part) => PARTS[part]).join(', ')}; by ${template.createdBy}, ${formatDay(template.createdAt)}`}
        </Text>
      </View>
      {onDelete ? (
        <Button
          label={`Delete the template ${template.name}`}
          icon="delete"
          iconOnly
          kind="plain"
          onPress={onDelete}
        />
      ) : null}
    </View>
  );
}

function DeleteTemplate({
  vehicle,
  template,
  onClose,
}: {
  vehicle: Vehicle;
  template: MapTemplate;
  onClose: () => void;
}) {
  const remove = useDeleteMapTemplate(vehicle.id);
  const toast = useToast();
  const confirm = async () => {
    try {
      await remove.mutateAsync(template.id);
      onClose();
      toast({ message: `The template “${template.name}” is deleted.` });
    } catch {
      // shown below from the mutation's own state
    }
  };
  return (
    <ConfirmDialog
      open
      danger
      title={`Delete the template “${template.name}”?`}
      message="Later recordings can no longer take it over. Recordings that were mapped by it keep their map."
      confirmLabel="Delete the template"
      busy={remove.isPending}
      onConfirm={() => void confirm()}
      onClose={onClose}
    >
      {remove.isError ? (
        <Notice tone="vermilion" urgent title="Not deleted">
          {messageOf(remove.error)}
        </Notice>
      ) : null}
    </ConfirmDialog>
  );
}

const PARTS = { imu: 'IMU', gnss: 'GNSS', reference: 'reference', aids: 'other sensors' } as const;

const styles = StyleSheet.create({
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    gap: space.s,
    borderTopWidth: hairline,
    paddingTop: space.s,
  },
  words: { flex: 1, minWidth: 0 },
});
