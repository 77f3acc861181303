import { View, type DimensionValue } from 'react-native';
import { hairline, radius, space } from '@/constants/theme';
import { Text } from './Text';
import { useTheme } from './ThemeProvider';

/** A still grey block where something is about to be. */
export function Skeleton({ width = '100%', height = 16 }: { width?: DimensionValue; height?: number }) {
  const { palette } = useTheme();
  return <View aria-hidden style={{ width, height, borderRadius: radius, backgroundColor: palette.well }} />;
}

/** A list that is loading; the screen reader hears what. */
export function SkeletonList({
  rows = 4,
  height = 96,
  label,
}: {
  rows?: number;
  height?: number;
  label: string;
}) {
  const { palette } = useTheme();
  return (
    <View role="status" aria-label={`Loading ${label}`} style={{ gap: space.m }}>
      <Text variant="label" tone="soft">{`Loading ${label} …`}</Text>
      {Array.from({ length: rows }, (_, row) => (
        <View
          key={row}
          style={{
            height,
            padding: space.l,
            gap: space.m,
            borderRadius: radius,
            borderWidth: hairline,
            borderColor: palette.rule,
            backgroundColor: palette.sheet,
            overflow: 'hidden',
          }}
        >
          <Skeleton width="46%" height={18} />
          <Skeleton width="70%" height={12} />
          <Skeleton height={22} />
        </View>
      ))}
    </View>
  );
}
