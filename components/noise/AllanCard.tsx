import { Suspense, useMemo, useState } from 'react';
import { View } from 'react-native';
import { AllanChart } from '@/components/charts/quiet/AllanChart';
import { allanSave } from '@/components/charts/quiet/quiet-saves';
import { SaveControl } from '@/components/charts/SaveControl';
import { VisuallyHidden } from '@/components/charts/VisuallyHidden';
import { Card } from '@/components/ui/Card';
import { Skeleton } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { useDisplayUnits } from '@/hooks/preferences';
import type { NoiseAnalysis } from '@/shared/contracts/noise';
import type { SensorFigures } from '@/shared/contracts/vehicles';
import { displayUnit } from '@/shared/display-units';
import { formatNumber } from '@/shared/format';
import { allanCurves, datasheetCurve } from './allan-content';
import { SENSORS, type Sensor } from './sensors';

const HEIGHT = 320;

export interface AllanCardProps {
  sensor: Sensor;
  analysis: NoiseAnalysis;
  datasheet: SensorFigures | null;
}

/** Allan deviation of a sensor's three axes over the averaging time, with what was fitted and what the datasheet says. */
export function AllanCard({ sensor, analysis, datasheet }: AllanCardProps) {
  const [width, setWidth] = useState(0);
  const chosen = useDisplayUnits();
  const { title, deviation } = SENSORS[sensor];
  const unit = displayUnit(deviation, chosen).symbol;
  const curves = useMemo(() => allanCurves(analysis, sensor, chosen), [analysis, sensor, chosen]);
  const expected = useMemo(() => {
    const taus = curves.flatMap(({ points }) => points.map(({ tauS }) => tauS));
    return datasheetCurve(datasheet, sensor, [Math.min(...taus), Math.max(...taus)], chosen);
  }, [curves, datasheet, sensor, chosen]);
  const heading = `${title}: Allan deviation`;
  const sentences = curves.map((curve) => sentence(curve, unit)).join(' ');
  const save = allanSave(
    { curves, expected, unit },
    { title: heading, aside: 'bars 68 %', sentence: sentences },
  );
  return (
    <Card title={heading} action={<SaveControl name={heading} {...save} />}>
      <Text variant="label" tone="soft">
        {`x solid, y dashed, z dotted; bars 68 %; the fit in thin lines${expected ? '; the datasheet in grey' : ''}.`}
      </Text>
      <View
        style={{ height: HEIGHT }}
        onLayout={(event) => setWidth(Math.floor(event.nativeEvent.layout.width))}
      >
        {width > 0 ? (
          <View aria-hidden>
            <Suspense fallback={<Skeleton height={HEIGHT} />}>
              <AllanChart curves={curves} expected={expected} unit={unit} width={width} height={HEIGHT} />
            </Suspense>
          </View>
        ) : null}
        <VisuallyHidden>
          <Text>{sentences}</Text>
        </VisuallyHidden>
      </View>
    </Card>
  );
}

function sentence({ axis, points }: ReturnType<typeof allanCurves>[number], unit: string): string {
  const lowest = points.reduce((a, b) => (b.deviation < a.deviation ? b : a));
  const [first] = points;
  return `Axis ${axis}: ${formatNumber(first!.deviation)} ${unit} at ${formatNumber(first!.tauS)} s, lowest ${formatNumber(lowest.deviation)} ${unit} at ${formatNumber(lowest.tauS)} s.`;
}
