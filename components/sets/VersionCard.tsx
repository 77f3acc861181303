import { router } from 'expo-router';
import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { benchPath } from '@/components/layout/paths';
import { RecordingPicker } from '@/components/recordings/RecordingPicker';
import { Button } from '@/components/ui/Button';
import { CommentsCard } from '@/components/review/CommentsCard';
import { ExportCard } from '@/components/review/ExportCard';
import { HistoryCard } from '@/components/review/HistoryCard';
import { ReportCard } from '@/components/report/ReportCard';
import { ReviewCard } from '@/components/review/ReviewCard';
import { Card } from '@/components/ui/Card';
import { Choice } from '@/components/ui/Choice';
import { Figures } from '@/components/ui/Figures';
import { formatMoment } from '@/components/ui/format-day';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import { useDisplayUnits } from '@/hooks/preferences';
import { useRecording } from '@/hooks/recordings';
import { exportUrl } from '@/hooks/versions';
import { VerificationCard } from '@/components/verification/VerificationCard';
import type { ParameterSetDetail, ParameterSetVersion } from '@/shared/contracts/parameter-sets';
import { changeCount, parameterSections } from './parameter-rows';
import { ParameterTable } from './ParameterTable';
import { VERSION_STATES } from './version-words';

export interface VersionCardProps {
  set: ParameterSetDetail;
  version: ParameterSetVersion;
}

/** One version: why, by whom, where it stands, what it holds, what it changed, and what is said of it. */
export function VersionCard({ set, version }: VersionCardProps) {
  const others = set.versions.filter(({ number }) => number !== version.number);
  const [against, setAgainst] = useState<number | null>(null);
  const parent =
    others.find(({ number }) => number === against) ??
    others.find(({ number }) => number === version.parentNumber) ??
    null;
  const of = { setId: set.id, number: version.number };
  const sections = parameterSections(version.parameters, parent?.parameters ?? null, useDisplayUnits());
  const { word, tone } = VERSION_STATES[version.state];
  return (
    <>
      <Card>
        <View style={styles.head}>
          <View style={styles.words}>
            <Text variant="heading">{`Version ${version.number}`}</Text>
            <Figures tone="soft">{`${version.createdBy}, ${formatMoment(version.createdAt)}`}</Figures>
          </View>
          <Text variant="label" strong tone={tone}>
            {word}
          </Text>
        </View>
        <Text>{version.note}</Text>
        <Tuned version={version} setId={set.id} />
      </Card>
      <ReviewCard set={set} version={version} />
      <VerificationCard of={of} />
      <Card title="Parameters" action={<Summary parent={parent} changes={changeCount(sections)} />}>
        {others.length > 1 ? (
          <Choice
            label="Compared with"
            shape="select"
            placeholder="Choose a version"
            value={parent ? String(parent.number) : ''}
            options={others.map(({ number }) => ({ value: String(number), label: `version ${number}` }))}
            onChange={(number) => setAgainst(Number(number))}
          />
        ) : null}
        <ParameterTable sections={sections} parentName={parent ? `version ${parent.number}` : null} />
      </Card>
      <ReportCard of={of} name={`${set.name} v${version.number}`} />
      <CommentsCard of={of} />
      <ExportCard
        title="Export"
        name={`${set.name} v${version.number}`}
        urlOf={(format) => exportUrl(of, format)}
        unreleased={version.state !== 'released'}
      />
      <HistoryCard of={of} />
    </>
  );
}

function Summary({ parent, changes }: { parent: ParameterSetVersion | null; changes: number }) {
  if (!parent)
    return (
      <Text variant="label" tone="soft">
        first version
      </Text>
    );
  return (
    <Figures tone="soft">
      {changes === 0
        ? `nothing changed against version ${parent.number}`
        : `${changes} changed against version ${parent.number}`}
    </Figures>
  );
}

/** Which recording it was tuned on, and the ways to the bench. */
function Tuned({ version, setId }: { version: ParameterSetVersion; setId: string }) {
  const [picking, setPicking] = useState(false);
  const recording = useRecording(version.recordingId ?? '');
  const open = (recordingId: string) =>
    router.push(benchPath(recordingId, { setId, number: version.number }));
  const looking = version.recordingId !== null && recording.isPending;
  const tunedOn = version.recordingId && recording.data?.status === 'ready' ? recording.data : null;
  return (
    <>
      {tunedOn ? (
        <Figures tone="soft">{`Tuned on ${tunedOn.name}${outageWords(version.outages.length)}`}</Figures>
      ) : null}
      <View style={styles.buttons}>
        {tunedOn ? (
          <Button label="Open on the bench" kind="primary" icon="bench" onPress={() => open(tunedOn.id)} />
        ) : null}
        {looking ? (
          <Button
            label="Open on the bench"
            kind="primary"
            icon="bench"
            disabled
            reason="Looking for the recording that it was tuned on."
            onPress={() => undefined}
          />
        ) : null}
        <Button
          label={tunedOn || looking ? 'On another recording' : 'Open on the bench'}
          icon={tunedOn || looking ? undefined : 'bench'}
          onPress={() => setPicking(true)}
        />
      </View>
      {picking ? (
        <RecordingPicker
          title={`Version ${version.number} on which recording?`}
          onPick={(chosen) => open(chosen.id)}
          onClose={() => setPicking(false)}
        />
      ) : null}
    </>
  );
}

const outageWords = (count: number) =>
  count === 0 ? '' : count === 1 ? ', with 1 outage window' : `, with ${count} outage windows`;

const styles = StyleSheet.create({
  head: { flexDirection: 'row', flexWrap: 'wrap', justifyContent: 'space-between', gap: space.m },
  words: { flexShrink: 1 },
  buttons: { flexDirection: 'row', flexWrap: 'wrap', gap: space.s },
});
