import { router } from 'expo-router';
import { benchHref } from '@/components/bench/bench-link';
import { hrefOf } from '@/components/layout/paths';
import { Button } from '@/components/ui/Button';
import { messageOf } from '@/components/ui/ErrorState';
import { useToast } from '@/components/ui/ToastProvider';
import { useCan } from '@/hooks/session';
import { usePatchVehicle } from '@/hooks/vehicles';
import type { NoiseAnalysis } from '@/shared/contracts/noise';
import type { Recording } from '@/shared/contracts/recordings';
import type { Vehicle } from '@/shared/contracts/vehicles';
import { startValues } from './start-values';

export interface NoiseActionsProps {
  recording: Recording;
  /** Null: the recording has none, or it has not been fetched. */
  vehicle: Vehicle | null;
  analysis: NoiseAnalysis;
}

/** Keeps the figures with the vehicle, or tries them at once. */
export function NoiseActions({ recording, vehicle, analysis }: NoiseActionsProps) {
  const mayWrite = useCan('vehicle:write');
  const patch = usePatchVehicle(vehicle?.id ?? '');
  const toast = useToast();
  const changes = startValues(analysis.figures);
  const keep = async (of: Vehicle) => {
    try {
      const { fromS, toS, figures } = analysis;
      const measuredAt = new Date().toISOString();
      const source = { recordingId: recording.id, recordingName: recording.name, fromS, toS, measuredAt };
      await patch.mutateAsync({
        sensor: {
          name: of.sensor?.name ?? '',
          datasheet: of.sensor?.datasheet ?? null,
          measured: { ...figures, ...source },
        },
      });
      toast({ message: `Kept as the measured noise of ${of.name}.` });
    } catch (error) {
      toast({ message: `Not kept: ${messageOf(error)}` });
    }
  };
  return (
    <>
      {mayWrite && vehicle ? (
        <Button
          label={`Keep with ${vehicle.name}`}
          busy={patch.isPending}
          onPress={() => void keep(vehicle)}
        />
      ) : null}
      {changes.length > 0 ? (
        <Button
          label="Start the bench with these"
          kind="primary"
          icon="bench"
          onPress={() => router.push(hrefOf(benchHref({ recordingId: recording.id, changes })))}
        />
      ) : null}
    </>
  );
}
