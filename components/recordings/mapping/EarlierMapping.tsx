import { View } from 'react-native';
import { Card } from '@/components/ui/Card';
import { Choice } from '@/components/ui/Choice';
import { Text } from '@/components/ui/Text';
import { formatDay } from '@/components/ui/format-day';
import { space } from '@/constants/theme';
import { useRecordingsOfVehicle } from '@/hooks/recordings';
import type { FilePreview, Recording } from '@/shared/contracts/recordings';
import { fits } from './earlier-maps';
import type { TakeMap } from './PreviewFindings';

export interface EarlierMappingProps {
  recording: Pick<Recording, 'id' | 'vehicleId' | 'vehicleName'>;
  previews: readonly FilePreview[];
  onTake: TakeMap;
}

/** The mapping of an earlier recording of the vehicle, as far as these files have its columns. Nothing where there is none. */
export function EarlierMapping({ recording, previews, onTake }: EarlierMappingProps) {
  const earlier = useRecordingsOfVehicle(recording.vehicleId ?? '');
  const others = (earlier.data ?? []).filter(({ id, channelMap }) => id !== recording.id && channelMap);
  if (others.length === 0) return null;
  const fitting = others.filter(({ channelMap }) => fits(channelMap!, previews));
  const left = others.length - fitting.length;
  const take = (id: string) => {
    const chosen = fitting.find((one) => one.id === id);
    if (chosen?.channelMap) onTake(chosen.channelMap, `The mapping of “${chosen.name}”`);
  };
  return (
    <Card>
      {fitting.length > 0 ? (
        <Choice
          label="Use the mapping of an earlier recording of this vehicle"
          placeholder="Choose a recording"
          options={fitting.map(({ id, name, createdAt }) => ({
            value: id,
            label: `${name}, ${formatDay(createdAt)}`,
          }))}
          value=""
          onChange={take}
          hint={left > 0 ? `${left} more of ${recording.vehicleName ?? 'it'} with other columns.` : undefined}
        />
      ) : (
        <View style={{ gap: space.xs }}>
          <Text variant="label" strong>
            Earlier recordings of this vehicle
          </Text>
          <Text variant="label" tone="soft">
            {`None of the latest ${left} has these columns, so their mapping cannot be taken over.`}
          </Text>
        </View>
      )}
    </Card>
  );
}
