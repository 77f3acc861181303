import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { Figures } from '@/components/ui/Figures';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { useToast } from '@/components/ui/ToastProvider';
import { fonts, hairline, space } from '@/constants/theme';
import { formatBytes } from '@/shared/format';
import type { RecordingFile } from '@/shared/contracts/recordings';
import { FILE_ROLE } from './status';

/** The raw files as they came, with the hashes that a report quotes. */
export function FilesCard({ files }: { files: readonly RecordingFile[] }) {
  const { palette } = useTheme();
  const toast = useToast();
  const copy = async (file: RecordingFile) => {
    try {
      await navigator.clipboard.writeText(file.sha256);
      toast({ message: `SHA-256 of ${file.name} copied.` });
    } catch {
      toast({ message: 'The browser did not allow copying.', tone: 'ochre' });
    }
  };
  return (
    <Card title="Files">
      {files.map((file, at) => (
        <View
          key={file.role}
          style={[styles.file, at > 0 ? { borderTopWidth: hairline, borderTopColor: palette.rule } : null]}
        >
          <View style={styles.words}>
            <Text variant="label" strong>
              {FILE_ROLE[file.role]}
            </Text>
            <Figures tone="soft">{`${file.name} · ${formatBytes(file.bytes)}`}</Figures>
            <Text variant="small" tone="soft" numberOfLines={1} aria-label={`SHA-256 ${file.sha256}`}>
              {'SHA-256 '}
              <Text variant="small" tone="soft" style={{ fontFamily: fonts.number }}>
                {`${file.sha256.slice(0, 16)}…`}
              </Text>
            </Text>
          </View>
          <Button
            label={`Copy the SHA-256 of ${file.name}`}
            icon="copy"
            iconOnly
            kind="plain"
            onPress={() => void copy(file)}
          />
        </View>
      ))}
    </Card>
  );
}

const styles = StyleSheet.create({
  file: { flexDirection: 'row', alignItems: 'center', gap: space.s, paddingTop: space.s },
  words: { flex: 1, minWidth: 0 },
});
