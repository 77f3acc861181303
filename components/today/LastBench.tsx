import { Link } from 'expo-router';
import { Pressable, StyleSheet, View } from 'react-native';
import { lastBench } from '@/components/bench/last-bench';
import { sourceLine } from '@/components/recordings/RecordingCard';
import { StripBox } from '@/components/recordings/StripBox';
import { Figures } from '@/components/ui/Figures';
import { Icon } from '@/components/ui/Icon';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, radius, space } from '@/constants/theme';
import { useRecording } from '@/hooks/recordings';
import { useSession } from '@/hooks/session';

/** The way back to the bench that was open last, as it was left; nothing where there is none, or its recording is gone. */
export function LastBench() {
  const { palette } = useTheme();
  const href = lastBench(useSession().workspace.id);
  const recording = useRecording(href?.split(/[/?]/)[2] ?? '').data;
  if (!href || !recording?.strip) return null;
  return (
    <View style={{ gap: space.s }}>
      <Text variant="heading">Last bench</Text>
      <Link href={href} asChild>
        <Pressable aria-label={`Go on with ${recording.name} on the bench`}>
          <View style={[styles.card, { backgroundColor: palette.sheet, borderColor: palette.rule }]}>
            <View style={styles.head}>
              <View style={styles.words}>
                <Text strong>{recording.name}</Text>
                <Figures tone="soft">{sourceLine(recording)}</Figures>
              </View>
              <Icon name="forward" tone="soft" size={20} />
            </View>
            <StripBox strip={recording.strip} height={44} compact />
          </View>
        </Pressable>
      </Link>
    </View>
  );
}

const styles = StyleSheet.create({
  card: { borderWidth: hairline, borderRadius: radius, padding: space.m, gap: space.s },
  head: { flexDirection: 'row', alignItems: 'center', gap: space.m },
  words: { flex: 1, minWidth: 0 },
});
