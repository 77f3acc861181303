import { StyleSheet, View } from 'react-native';
import { reportPath } from '@/components/layout/paths';
import { Card } from '@/components/ui/Card';
import { FileLink } from '@/components/ui/FileLink';
import { Text } from '@/components/ui/Text';
import { TextLink } from '@/components/ui/TextLink';
import { space } from '@/constants/theme';
import { reportPdfUrl } from '@/hooks/report';
import type { VersionRef } from '@/hooks/versions';

/** The ways to a version's evidence. */
export function ReportCard({ of, name }: { of: VersionRef; name: string }) {
  return (
    <Card title="Report">
      <Text variant="label" tone="soft">
        What was tested, on which data, with which result, by whom.
      </Text>
      <View style={styles.links}>
        <TextLink
          href={reportPath(of.setId, of.number)}
          label="Read it"
          spoken={`Read the report of ${name}`}
        />
        <FileLink href={reportPdfUrl(of)} label="PDF" of={`Report of ${name}`} />
      </View>
    </Card>
  );
}

const styles = StyleSheet.create({ links: { flexDirection: 'row', alignItems: 'center', gap: space.xl } });
