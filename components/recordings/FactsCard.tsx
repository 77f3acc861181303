import { Card } from '@/components/ui/Card';
import { Facts, type Fact } from '@/components/ui/Facts';
import { formatMoment } from '@/components/ui/format-day';
import { formatClock, formatDuration, formatNumber } from '@/shared/format';
import type { Recording } from '@/shared/contracts/recordings';

/** When, how long, on which clock. */
export function FactsCard({ recording }: { recording: Recording }) {
  return (
    <Card title="Facts">
      <Facts facts={factsOf(recording)} />
    </Card>
  );
}

function factsOf(recording: Recording): Fact[] {
  const { health, timeOrigin } = recording;
  const facts: Fact[] = [
    { label: 'Uploaded', value: `${formatMoment(recording.createdAt)} by ${recording.createdBy}` },
    { label: 'Vehicle', value: recording.vehicleName ?? 'none yet' },
  ];
  if (recording.durationS !== null && recording.startS !== null && recording.endS !== null)
    facts.push({
      label: 'Length',
      value: `${formatDuration(recording.durationS)}, from ${formatClock(recording.startS)} to ${formatClock(recording.endS)}`,
    });
  if (health) {
    const given = [
      health.gnss.hasVelocity ? 'velocity' : null,
      health.gnss.hasPositionSigma ? 'position accuracy' : null,
      health.gnss.hasVelocitySigma ? 'velocity accuracy' : null,
    ].filter(Boolean);
    facts.push({ label: 'GNSS gives', value: ['position', ...given].join(', ') });
    facts.push({
      label: 'Overlap',
      value: `${formatDuration(health.overlapS[1] - health.overlapS[0])} with IMU and GNSS both`,
    });
  }
  if (timeOrigin) facts.push({ label: 'Time 0 is', value: originSentence(timeOrigin) });
  facts.push({
    label: 'Reference',
    value: recording.hasReference ? 'uploaded trajectory' : 'none: the aided solution',
  });
  return facts;
}

function originSentence(origin: NonNullable<Recording['timeOrigin']>): string {
  if (origin.utc) return `${origin.utc.replace('T', ' ').replace(/\.?0*Z$/, '')} UTC`;
  if (origin.gpsWeek !== null && origin.gpsTowS !== null)
    return `GPS week ${origin.gpsWeek}, ${formatNumber(origin.gpsTowS, 9)} s`;
  return `${formatNumber(origin.sourceS, 6)} s on the IMU’s own clock`;
}
