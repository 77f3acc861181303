import { View } from 'react-native';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import { CAUTIONS } from '@/shared/cautions';

/** What is said wherever a set is released, exported or reported. */
export function Cautions() {
  return (
    <View role="list" aria-label="Cautions" style={{ gap: space.xs }}>
      {CAUTIONS.map((line) => (
        <View key={line} role="listitem">
          <Text variant="label" tone="ochre">{`·  ${line}`}</Text>
        </View>
      ))}
    </View>
  );
}
