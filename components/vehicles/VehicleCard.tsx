import { StyleSheet, View } from 'react-native';
import { vehiclePath } from '@/components/layout/paths';
import { CardLink } from '@/components/ui/CardLink';
import { Figures } from '@/components/ui/Figures';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import { useDisplayUnits } from '@/hooks/preferences';
import type { Vehicle } from '@/shared/contracts/vehicles';
import { scaleOf, type DisplayUnits } from '@/shared/display-units';
import { axesSentence } from './axes';
import { KINDS } from './vehicle-words';

export interface VehicleCardProps {
  vehicle: Vehicle;
  /** Parameters of the list's address that its link carries on. */
  query?: Readonly<Record<string, string>>;
  current?: boolean;
}

/** One vehicle in the list. */
export function VehicleCard({ vehicle, query, current }: VehicleCardProps) {
  const units = useDisplayUnits();
  const count = `${vehicle.recordingCount} ${vehicle.recordingCount === 1 ? 'recording' : 'recordings'}`;
  return (
    <CardLink
      href={vehiclePath(vehicle.id, query)}
      label={`${vehicle.name}, ${KINDS[vehicle.kind]}, ${count}`}
      current={current}
    >
      <View style={styles.head}>
        <Text strong style={styles.name}>
          {vehicle.name}
        </Text>
        <Figures tone="soft">{count}</Figures>
      </View>
      <Figures tone="soft">{`${KINDS[vehicle.kind]} · IMU ${axesSentence(vehicle.axes)}`}</Figures>
      <Figures tone="soft">{`antenna ${leverArmLine(vehicle.leverArmM, units)}`}</Figures>
    </CardLink>
  );
}

/** "0.4 m forward, 0 m right, −1.2 m down" */
export function leverArmLine(arm: Vehicle['leverArmM'], chosen: DisplayUnits = {}): string {
  const { symbol, factor } = scaleOf('length', chosen);
  const [forward, right, down] = arm.map((metres) => `${asTyped(metres * factor)} ${symbol}`);
  return `${forward} forward, ${right} right, ${down} down`;
}

const asTyped = (value: number) => String(Number(value.toPrecision(4))).replace('-', '−');

const styles = StyleSheet.create({
  head: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    justifyContent: 'space-between',
    alignItems: 'baseline',
    columnGap: space.m,
  },
  name: { fontSize: 17, flexShrink: 1 },
});
