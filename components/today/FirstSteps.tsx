import { router } from 'expo-router';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { fonts, hairline, space } from '@/constants/theme';

const STEPS = [
  ['Add the vehicle', 'How its IMU is mounted, and where the GNSS antenna sits.'],
  ['Upload a drive', 'The IMU log and the GNSS log; you see within a minute whether they are usable.'],
  ['Open the bench', 'Slide Q and R, cut GNSS on purpose, watch how far the solution runs.'],
  ['Save a version', 'With a note; the team opens exactly what you saw.'],
] as const;

/** What to do in an empty workspace. */
export function FirstSteps({ mayUpload }: { mayUpload: boolean }) {
  const { palette } = useTheme();
  return (
    <Card title="First steps">
      <View role="list">
        {STEPS.map(([title, words], at) => (
          <View
            key={title}
            role="listitem"
            style={[styles.step, at > 0 ? { borderTopWidth: hairline, borderTopColor: palette.rule } : null]}
          >
            <Text tone="petrol" style={styles.number}>
              {at + 1}
            </Text>
            <View style={styles.words}>
              <Text strong>{title}</Text>
              <Text variant="label" tone="soft">
                {words}
              </Text>
            </View>
          </View>
        ))}
      </View>
      {mayUpload ? (
        <View style={styles.buttons}>
          <Button
            label="Upload a recording"
            icon="upload"
            kind="primary"
            onPress={() => router.push('/recordings/upload')}
          />
          <Button label="Add a vehicle" icon="vehicle" onPress={() => router.push('/vehicles/new')} />
        </View>
      ) : (
        <Text variant="label" tone="soft">
          You read here; an engineer begins.
        </Text>
      )}
    </Card>
  );
}

const styles = StyleSheet.create({
  step: { flexDirection: 'row', gap: space.l, paddingVertical: space.m },
  number: { fontFamily: fonts.number, width: 24 },
  words: { flex: 1 },
  buttons: { flexDirection: 'row', flexWrap: 'wrap', gap: space.s },
});
