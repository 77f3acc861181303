import { useSyncExternalStore, type ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import Svg, { Path, Rect } from 'react-native-svg';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { fonts, space } from '@/constants/theme';
import { formatNumber } from '@/shared/format';
import type { ChartGroup } from './chart-group';
import { inkOf } from '@/shared/charts/model/layer-style';
import type { ChartContent, Layer } from '@/shared/charts/model/layers';
import { legendOrder, samplePath } from '@/shared/charts/model/legend';
import { readLayer } from './table-rows';
import { formatAxisTime } from '@/shared/charts/model/ticks';

export interface ChartLegendProps {
  content: ChartContent;
  group: ChartGroup;
  /** Beside the unit: what is compared, what lies beyond the scale. */
  aside: string;
  /** Title and unit in one line, the legend in the next. */
  narrow: boolean;
  /** At the end of the line. */
  action?: ReactNode;
}

/** Title, what each line is, and at the cursor its value; the unit to the right. */
export function ChartLegend({ content, group, aside, narrow, action }: ChartLegendProps) {
  const cursor = useSyncExternalStore(group.cursor.subscribe, () => group.cursor.current);
  const detail = useSyncExternalStore(group.detail.subscribe, () => group.detail.current);
  const legend = (
    <View style={styles.legend}>
      {legendOrder(content.layers).map((layer) => (
        <View key={layer.id} style={styles.entry}>
          <Sample layer={layer} />
          <Text variant="small" tone="soft">
            {layer.label}
          </Text>
          {cursor === null ? null : <Reading layer={layer} timeS={cursor} />}
        </View>
      ))}
    </View>
  );
  const title = (
    <Text variant="label" strong level={3} style={styles.title}>
      {content.title}
    </Text>
  );
  const end = (
    <>
      <Text variant="small" tone="soft" style={styles.unit}>
        {[DETAIL[detail], cursor === null ? aside : `at ${formatAxisTime(cursor, 0.1)}`, content.unit]
          .filter(Boolean)
          .join(' · ')}
      </Text>
      {action}
    </>
  );
  return narrow ? (
    <View>
      <View style={styles.line}>
        {title}
        {end}
      </View>
      {legend}
    </View>
  ) : (
    <View style={styles.row}>
      {title}
      {legend}
      {end}
    </View>
  );
}

const DETAIL = {
  held: '',
  fetching: 'finer points are coming',
  failed: 'finer points did not come: the curve is coarse',
} as const;

function Reading({ layer, timeS }: { layer: Layer; timeS: number }) {
  const value = readLayer(layer, timeS);
  if (value === null) return null;
  return (
    <Text variant="small" style={styles.number}>
      {(layer.kind === 'band' ? '±' : '') + formatNumber(value, 3)}
    </Text>
  );
}

function Sample({ layer }: { layer: Layer }) {
  const { palette } = useTheme();
  const ink = inkOf(layer, palette);
  if (layer.kind === 'band' || layer.kind === 'area')
    return (
      <Svg width={16} height={10} aria-hidden>
        <Rect x={0.5} y={1} width={15} height={8} {...ink} strokeOpacity={0.6} fillOpacity={0.2} />
      </Svg>
    );
  return (
    <Svg width={18} height={10} aria-hidden>
      <Path d={samplePath(layer.kind)} {...ink} />
    </Svg>
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', columnGap: space.m, minHeight: 24 },
  legend: { flexDirection: 'row', flexWrap: 'wrap', flexGrow: 1, columnGap: space.m, alignItems: 'center' },
  line: { flexDirection: 'row', alignItems: 'center', columnGap: space.m, minHeight: 24 },
  title: { flexShrink: 1 },
  entry: { flexDirection: 'row', alignItems: 'center', gap: space.xs },
  unit: { marginLeft: 'auto', flexShrink: 1, textAlign: 'right' },
  number: { fontFamily: fonts.number },
});
