import { StyleSheet, View } from 'react-native';
import { versionPath } from '@/components/layout/paths';
import { Screen } from '@/components/layout/Screen';
import { Card } from '@/components/ui/Card';
import { ErrorState } from '@/components/ui/ErrorState';
import { Facts } from '@/components/ui/Facts';
import { Figures } from '@/components/ui/Figures';
import { FileLink } from '@/components/ui/FileLink';
import { formatMoment } from '@/components/ui/format-day';
import { Notice } from '@/components/ui/Notice';
import { SkeletonList } from '@/components/ui/Skeleton';
import { Text } from '@/components/ui/Text';
import { Cautions } from '@/components/review/Cautions';
import { space } from '@/constants/theme';
import { reportPdfUrl, useReport } from '@/hooks/report';
import type { VersionRef } from '@/hooks/versions';
import type { Report } from '@/shared/contracts/report';
import { formatDuration, formatNumber } from '@/shared/format';
import { ReportMatrix } from './ReportMatrix';
import { ReportRuns } from './ReportRuns';
import { ReportTable, type ReportCell } from './ReportTable';

/** The evidence for a version on one page, summary first; the same as the PDF. */
export function ReportScreen({ of }: { of: VersionRef }) {
  const report = useReport(of);
  const back = versionPath(of.setId, of.number);
  if (report.isError)
    return (
      <Screen title="Report" back={back}>
        <ErrorState
          title="The report cannot be shown"
          error={report.error}
          onRetry={() => void report.refetch()}
        />
      </Screen>
    );
  if (!report.data)
    return (
      <Screen title="Report" back={back}>
        <SkeletonList label="the report" rows={3} height={160} />
      </Screen>
    );
  return <Loaded of={of} report={report.data} />;
}

function Loaded({ of, report }: { of: VersionRef; report: Report }) {
  const { set, version, madeAt } = report;
  const name = `${set.name} v${version.number}`;
  return (
    <Screen
      title={`${name}: report`}
      subtitle={<Figures tone="soft">{`made ${formatMoment(madeAt)}`}</Figures>}
      back={versionPath(of.setId, of.number)}
      actions={<FileLink href={reportPdfUrl(of)} label="Download the PDF" of={`Report of ${name}`} />}
      width="page"
    >
      <Notice tone={version.state === 'released' ? 'pine' : 'vermilion'} title={report.notice} />
      <Card title="Summary">
        {report.summary.slice(1).map((sentence) => (
          <Figures key={sentence} variant="body">
            {sentence}
          </Figures>
        ))}
        <Cautions />
      </Card>
      <People report={report} />
      <Card title="Verification">
        <ReportMatrix matrix={report.matrix} />
      </Card>
      <Card title="Consistency and drift">
        <ReportRuns runs={report.runs} />
      </Card>
      <Data report={report} />
      <Parameters report={report} />
      <Card title="Method">
        <Text variant="label">{`Engine ${report.engineVersion}.`}</Text>
        {[...report.method, ...report.references].map((line) => (
          <Text key={line} variant="label">
            {line}
          </Text>
        ))}
      </Card>
    </Screen>
  );
}

function People({ report: { vehicle, people, reviewComment } }: { report: Report }) {
  const arm = vehicle?.leverArmM.map((metres) => formatNumber(metres)).join(', ');
  return (
    <Card title="Vehicle, people and dates">
      <Facts
        facts={[
          { label: 'Vehicle', value: vehicle?.name ?? 'none' },
          ...(vehicle ? [{ label: 'GNSS antenna', value: `${arm} m forward, right, down of the IMU` }] : []),
          ...(vehicle?.sensor ? [{ label: 'IMU', value: vehicle.sensor }] : []),
          ...people.map(({ did, name, at }) => ({ label: did, value: `${name}, ${formatMoment(at)}` })),
          ...(reviewComment ? [{ label: 'Reviewer says', value: reviewComment }] : []),
        ]}
      />
    </Card>
  );
}

function Data({ report: { recordings } }: { report: Report }) {
  return (
    <Card title="Data">
      {recordings.length === 0 ? (
        <Text variant="label" tone="ochre">
          No recording stands behind this version.
        </Text>
      ) : null}
      {recordings.map(({ id, name, durationS, verdict, sha256, files }) => (
        <View key={id} style={styles.item}>
          <Text strong>{name}</Text>
          <Figures>
            {[durationS === null ? '' : formatDuration(durationS), verdict].filter(Boolean).join('. ')}
          </Figures>
          {files.map((file) => (
            <Text key={file.role} variant="small" tone="soft">
              {`${file.role}: ${file.name}, SHA-256 ${file.sha256}`}
            </Text>
          ))}
          {sha256 ? <Text variant="small" tone="soft">{`decoded channels: SHA-256 ${sha256}`}</Text> : null}
        </View>
      ))}
    </Card>
  );
}

function Parameters({ report: { parameters, against, version } }: { report: Report }) {
  const titles = [
    'Parameter',
    'Value',
    'Unit',
    ...(against === null ? [] : [`Version ${against}`, 'Change']),
  ];
  return (
    <Card title="Parameters">
      <Text variant="small" tone="soft">
        {`SHA-256 over the parameters as canonical JSON (RFC 8785): ${version.checksum}`}
      </Text>
      <ReportTable
        label="Parameters"
        titles={titles}
        rows={parameters.map(({ group, label, unit, value, before, changed, percent }) => [
          { text: `${group}: ${label}`, tone: changed ? 'petrol' : 'ink' },
          shown(value),
          { text: unit },
          ...(against === null
            ? []
            : [
                shown(before),
                {
                  text: changed
                    ? percent === null
                      ? 'changed'
                      : `${percent > 0 ? '+' : ''}${formatNumber(percent, 2)} %`
                    : '',
                },
              ]),
        ])}
      />
    </Card>
  );
}

const shown = (value: number | string | null): ReportCell =>
  typeof value === 'number' ? { text: formatNumber(value), number: true } : { text: value ?? '–' };

const styles = StyleSheet.create({ item: { gap: 2, paddingVertical: space.s } });
