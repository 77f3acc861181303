import { StyleSheet, View } from 'react-native';
import { setPath } from '@/components/layout/paths';
import { CardLink } from '@/components/ui/CardLink';
import { Figures } from '@/components/ui/Figures';
import { formatDay } from '@/components/ui/format-day';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import type { ParameterSet } from '@/shared/contracts/parameter-sets';
import { VERSION_STATES } from './version-words';

export interface SetCardProps {
  set: ParameterSet;
  /** Parameters of the list's address that its link carries on. */
  query?: Readonly<Record<string, string>>;
  current?: boolean;
}

/** One parameter set in a list: its latest version, whose, when, and why. */
export function SetCard({ set, query, current }: SetCardProps) {
  const { word, tone } = VERSION_STATES[set.latest.state];
  const line = [
    set.vehicleName,
    `version ${set.latest.number}`,
    set.latest.createdBy,
    formatDay(set.latest.createdAt),
  ]
    .filter(Boolean)
    .join(' · ');
  return (
    <CardLink href={setPath(set.id, query)} label={`${set.name}, ${word}, ${line}`} current={current}>
      <View style={styles.head}>
        <Text strong style={styles.name}>
          {set.name}
        </Text>
        <Text variant="label" strong tone={tone}>
          {word}
        </Text>
      </View>
      <Figures tone="soft">{line}</Figures>
      <Text variant="label" numberOfLines={2}>
        {set.latest.note}
      </Text>
    </CardLink>
  );
}

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
