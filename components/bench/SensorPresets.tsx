import { StyleSheet, View } from 'react-native';
import { startValues } from '@/components/noise/start-values';
import type { Sensor } from '@/components/noise/sensors';
import { Button } from '@/components/ui/Button';
import { space } from '@/constants/theme';
import { useVehicle } from '@/hooks/vehicles';
import type { SensorFigures } from '@/shared/contracts/vehicles';
import type { Bench } from './use-bench';

/** Sets a sensor's parameters to what the vehicle's sensor model says; nothing where it says nothing. */
export function SensorPresets({ bench, sensor }: { bench: Bench; sensor: Sensor }) {
  const vehicle = useVehicle(bench.start.recording.vehicleId ?? '');
  const model = vehicle.data?.sensor;
  if (!model || bench.locked !== null) return null;
  return (
    <View style={styles.row}>
      <Preset bench={bench} sensor={sensor} label="As measured" figures={model.measured} />
      <Preset bench={bench} sensor={sensor} label="From the datasheet" figures={model.datasheet} />
    </View>
  );
}

interface PresetProps {
  bench: Bench;
  sensor: Sensor;
  label: string;
  figures: SensorFigures | null;
}

function Preset({ bench, sensor, label, figures }: PresetProps) {
  const changes = figures ? startValues(figures).filter(({ path }) => path.startsWith(`${sensor}.`)) : [];
  if (changes.length === 0) return null;
  return (
    <Button
      label={label}
      kind="plain"
      aria-label={`${label}: set the ${sensor === 'gyro' ? 'gyro' : 'accelerometer'}’s noise`}
      onPress={() => bench.setParameters(changes)}
    />
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', flexWrap: 'wrap', gap: space.s, marginLeft: -space.l },
});
