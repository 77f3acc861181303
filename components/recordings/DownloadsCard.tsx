import { StyleSheet, View } from 'react-native';
import { Card } from '@/components/ui/Card';
import { FileLink } from '@/components/ui/FileLink';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space, touchTarget } from '@/constants/theme';
import { decodedUrl, healthFileUrl } from '@/hooks/recording-files';
import type { DecodedChannel } from '@/shared/contracts/recording-files';
import type { Recording } from '@/shared/contracts/recordings';

const CHANNELS: Record<DecodedChannel, { title: string; holds: string }> = {
  imu: { title: 'IMU', holds: 'rad/s and m/s², vehicle axes' },
  gnss: { title: 'GNSS', holds: 'degrees, m and m/s, with σ' },
  reference: { title: 'Reference', holds: 'degrees, m and m/s' },
};

/** What the intake made of the files, for other programs: columns with their units, and the health report. */
export function DownloadsCard({ recording }: { recording: Pick<Recording, 'id' | 'hasReference'> }) {
  const { id, hasReference } = recording;
  const channels = (['imu', 'gnss', 'reference'] as const).filter((c) => c !== 'reference' || hasReference);
  return (
    <Card title="Downloads">
      {channels.map((channel, at) => (
        <Row key={channel} first={at === 0} title={CHANNELS[channel].title} holds={CHANNELS[channel].holds}>
          <FileLink href={decodedUrl(id, 'arrow', channel)} label="Arrow" of={CHANNELS[channel].title} />
          <FileLink href={decodedUrl(id, 'csv', channel)} label="CSV" of={CHANNELS[channel].title} />
        </Row>
      ))}
      <Row title="Health report" holds="findings, channel map, hashes">
        <FileLink href={healthFileUrl(id)} label="JSON" of="Health report" />
      </Row>
    </Card>
  );
}

interface RowProps {
  title: string;
  holds: string;
  first?: boolean;
  children: React.ReactNode;
}

function Row({ title, holds, first = false, children }: RowProps) {
  const { palette } = useTheme();
  return (
    <View style={[styles.row, first ? null : { borderTopWidth: hairline, borderTopColor: palette.rule }]}>
      <View style={styles.words}>
        <Text variant="label" strong>
          {title}
        </Text>
        <Text variant="small" tone="soft">
          {holds}
        </Text>
      </View>
      {children}
    </View>
  );
}

const styles = StyleSheet.create({
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    gap: space.l,
    minHeight: touchTarget,
    paddingVertical: space.xs,
  },
  words: { flex: 1, minWidth: 0 },
});
