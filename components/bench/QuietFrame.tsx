import { Suspense, useState, type ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import type { QuietSave } from '@/components/charts/quiet/quiet-saves';
import { SaveControl } from '@/components/charts/SaveControl';
import { VisuallyHidden } from '@/components/charts/VisuallyHidden';
import { Skeleton } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';

export interface QuietFrameProps {
  title: string;
  aside: string;
  /** The chart in a sentence; shown in its place where there is none. */
  words: string;
  height: number;
  /** What the chart saves; left out or null: nothing yet. */
  save?: QuietSave | null;
  /** Under the title; takes as many lines as it needs, and the chart what they leave. */
  legend?: ReactNode;
  /** Draws into what is left of the frame, px. */
  children: (width: number, height: number) => ReactNode;
}

/** Title, chart and its words: a chart that is drawn when a run is done. */
export function QuietFrame(props: QuietFrameProps) {
  const [width, setWidth] = useState(0);
  const [legendPx, setLegendPx] = useState(0);
  const room = Math.max(60, props.height - HEAD_PX - (props.legend ? legendPx : 0));
  const drawn = width > 0 ? props.children(width, room) : null;
  return (
    <View
      style={{ height: props.height }}
      onLayout={(event) => setWidth(Math.floor(event.nativeEvent.layout.width))}
    >
      <View style={styles.head}>
        <Text variant="label" strong level={3} style={styles.title}>
          {props.title}
        </Text>
        <Text variant="small" tone="soft" numberOfLines={1} style={styles.aside}>
          {props.aside}
        </Text>
        {props.save ? <SaveControl name={props.title} {...props.save} /> : null}
      </View>
      {drawn && props.legend ? (
        <View
          style={styles.legend}
          onLayout={(event) => setLegendPx(Math.ceil(event.nativeEvent.layout.height))}
        >
          {props.legend}
        </View>
      ) : null}
      {drawn ? (
        <>
          <View aria-hidden>
            <Suspense fallback={<Skeleton height={room} />}>{drawn}</Suspense>
          </View>
          <VisuallyHidden>
            <Text>{props.words}</Text>
          </VisuallyHidden>
        </>
      ) : (
        <Text variant="label" tone="soft" style={styles.words}>
          {props.words}
        </Text>
      )}
    </View>
  );
}

const HEAD_PX = 26;
const styles = StyleSheet.create({
  head: {
    height: HEAD_PX,
    flexDirection: 'row',
    alignItems: 'center',
    justifyContent: 'space-between',
    gap: space.m,
    paddingLeft: 46,
    paddingRight: space.s,
    zIndex: 1,
  },
  title: { flexShrink: 0 },
  aside: { flexShrink: 1, marginLeft: 'auto' },
  legend: { paddingLeft: 46, paddingRight: 8, paddingBottom: 2 },
  words: { paddingLeft: 46, paddingVertical: space.l },
});
