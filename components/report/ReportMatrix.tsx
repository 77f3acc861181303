import { View } from 'react-native';
import { Figures } from '@/components/ui/Figures';
import { formatMoment } from '@/components/ui/format-day';
import { Text } from '@/components/ui/Text';
import { cellWords } from '@/components/verification/cell-words';
import { space } from '@/constants/theme';
import type { Report } from '@/shared/contracts/report';
import { scheduleWords } from '@/shared/requirements/metric-words';
import { ReportTable } from './ReportTable';

/** Each requirement with its verdicts, and what was waived. */
export function ReportMatrix({ matrix }: { matrix: Report['matrix'] }) {
  const { requirements, recordings, cells, withoutRequirements } = matrix;
  const nameOf = (recordingId: string) => recordings.find(({ id }) => id === recordingId)?.name ?? '';
  if (withoutRequirements)
    return <Text tone="ochre">{`Released without requirements: ${withoutRequirements}`}</Text>;
  if (cells.length === 0) return <Text tone="ochre">Nothing was verified.</Text>;
  return (
    <View style={{ gap: space.l }}>
      {requirements.map((requirement) => (
        <View key={requirement.id} style={{ gap: space.xs }}>
          <Text strong>{requirement.name}</Text>
          <Figures tone="soft">{`${requirement.sentence}. Outages: ${scheduleWords(requirement.schedule)}.`}</Figures>
          <ReportTable
            label={requirement.name}
            titles={['Recording', 'Value', 'Verdict', 'Remark']}
            rows={cells
              .filter(({ requirementId }) => requirementId === requirement.id)
              .map((cell) => {
                const { verdict, tone, value, detail } = cellWords(cell, requirement.metric);
                return [
                  { text: nameOf(cell.recordingId) },
                  { text: value ?? '–', number: true },
                  { text: verdict, tone },
                  { text: detail },
                ];
              })}
          />
        </View>
      ))}
      {cells.map(({ waiver, requirementId, recordingId }) =>
        waiver ? (
          <Text key={waiver.id} variant="label">
            {`Waived: ${requirements.find(({ id }) => id === requirementId)?.name ?? ''} on ${nameOf(recordingId)}: ${waiver.text} (${waiver.createdBy}, ${formatMoment(waiver.createdAt)})`}
          </Text>
        ) : null,
      )}
    </View>
  );
}
