import { router } from 'expo-router';
import { StyleSheet, View } from 'react-native';
import { noisePath } from '@/components/layout/paths';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { Text } from '@/components/ui/Text';

/** From a recording to its sensor noise. */
export function NoiseLink({ recordingId }: { recordingId: string }) {
  return (
    <Card title="Sensor noise">
      <Text variant="label" tone="soft">
        Allan deviation of a stretch at rest: white noise, bias instability and random walk of each axis, as
        start values for Q.
      </Text>
      <View style={styles.row}>
        <Button label="Find the noise" onPress={() => router.push(noisePath(recordingId))} />
      </View>
    </Card>
  );
}

const styles = StyleSheet.create({ row: { flexDirection: 'row' } });
