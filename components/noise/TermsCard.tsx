import { StyleSheet, View } from 'react-native';
import { Card } from '@/components/ui/Card';
import { Quantity } from '@/components/ui/Quantity';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space } from '@/constants/theme';
import { useDisplayUnits } from '@/hooks/preferences';
import type { NoiseAnalysis } from '@/shared/contracts/noise';
import type { SensorFigures } from '@/shared/contracts/vehicles';
import { displayUnit } from '@/shared/display-units';
import { toDisplay } from '@/shared/units';
import { SENSORS, shownFigure, type FigureSpec, type Sensor } from './sensors';

export interface TermsCardProps {
  sensor: Sensor;
  analysis: NoiseAnalysis;
  datasheet: SensorFigures | null;
}

/** The fitted terms of a sensor, axis by axis with 1σ, beside the datasheet's. */
export function TermsCard({ sensor, analysis, datasheet }: TermsCardProps) {
  const { title, figures } = SENSORS[sensor];
  return (
    <Card title={`${title}: fitted terms`}>
      {figures
        .filter(({ term }) => term !== null)
        .map((spec) => (
          <Term key={spec.field} sensor={sensor} spec={spec} analysis={analysis} datasheet={datasheet} />
        ))}
    </Card>
  );
}

function Term({ sensor, spec, analysis, datasheet }: TermsCardProps & { spec: FigureSpec }) {
  const { palette } = useTheme();
  const chosen = useDisplayUnits();
  const unit = displayUnit(spec.quantity, chosen);
  const axes = analysis.axes.filter(({ channel }) => channel.startsWith(sensor));
  const promised = shownFigure(datasheet, sensor, spec, chosen);
  return (
    <View style={[styles.term, { borderTopColor: palette.rule }]}>
      <Text variant="label" strong>
        {spec.label}
      </Text>
      <View style={styles.axes}>
        {axes.map(({ channel, terms }) => {
          const { value, sigma } = terms[spec.term!];
          return (
            <View key={channel} style={styles.axis}>
              <Text variant="small" tone="soft">
                {`axis ${channel.slice(-1)}`}
              </Text>
              {value === null ? (
                <Text variant="label" tone="soft">
                  not observable
                </Text>
              ) : (
                <Quantity
                  value={toDisplay(value, unit)}
                  uncertainty={sigma === null ? undefined : toDisplay(sigma, unit)}
                  unit={unit.symbol}
                  size="label"
                />
              )}
            </View>
          );
        })}
        <View style={styles.axis}>
          <Text variant="small" tone="soft">
            datasheet
          </Text>
          {promised === null ? (
            <Text variant="label" tone="soft">
              –
            </Text>
          ) : (
            <Quantity value={promised} unit={unit.symbol} size="label" tone="soft" />
          )}
        </View>
      </View>
    </View>
  );
}

const styles = StyleSheet.create({
  term: { borderTopWidth: hairline, paddingTop: space.m, gap: space.xs },
  axes: { flexDirection: 'row', flexWrap: 'wrap', gap: space.m },
  axis: { flexGrow: 1, flexBasis: 120, minWidth: 0 },
});
