import { Pressable, StyleSheet, View } from 'react-native';
import { Figures } from '@/components/ui/Figures';
import { formatDay } from '@/components/ui/format-day';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { web } from '@/components/ui/web-props';
import { hairline, radius, space } from '@/constants/theme';
import type { ParameterSetVersion } from '@/shared/contracts/parameter-sets';
import { VERSION_STATES } from './version-words';

export interface VersionListProps {
  /** Newest first. */
  versions: readonly ParameterSetVersion[];
  current: number;
  onChoose: (number: number) => void;
}

/** The versions of a set as one list, the open one marked. */
export function VersionList({ versions, current, onChoose }: VersionListProps) {
  const { palette } = useTheme();
  return (
    <View
      role="group"
      aria-label="Versions"
      style={[styles.list, { borderColor: palette.rule, backgroundColor: palette.sheet }]}
    >
      {versions.map((version, at) => {
        const { word, tone } = VERSION_STATES[version.state];
        const open = version.number === current;
        return (
          <Pressable
            key={version.id}
            role="button"
            {...web({ 'aria-pressed': open })}
            onPress={() => onChoose(version.number)}
            style={({ pressed }) => [
              styles.row,
              at > 0 ? { borderTopWidth: hairline, borderTopColor: palette.rule } : null,
              open ? { boxShadow: `inset 3px 0 0 ${palette.petrol}` } : null,
              pressed ? { backgroundColor: palette.well } : null,
            ]}
          >
            <View style={styles.head}>
              <Figures strong>{`Version ${version.number}`}</Figures>
              <Text variant="label" strong tone={tone}>
                {word}
              </Text>
            </View>
            <Figures tone="soft">{`${version.createdBy} · ${formatDay(version.createdAt)}`}</Figures>
            <Text variant="label" numberOfLines={2}>
              {version.note}
            </Text>
          </Pressable>
        );
      })}
    </View>
  );
}

const styles = StyleSheet.create({
  list: { borderWidth: hairline, borderRadius: radius, overflow: 'hidden' },
  row: { padding: space.m, gap: 2 },
  head: { flexDirection: 'row', justifyContent: 'space-between', gap: space.m },
});
