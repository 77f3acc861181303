import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { Figures } from '@/components/ui/Figures';
import { Icon } from '@/components/ui/Icon';
import { Quantity } from '@/components/ui/Quantity';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space } from '@/constants/theme';
import { formatClock } from '@/shared/format';
import type { HealthFinding, HealthReport, Severity } from '@/shared/contracts/recordings';
import { VERDICTS } from './status';

export interface HealthCardProps {
  health: HealthReport;
  /** Shows a finding's first stretch on the plots. */
  onShow?: (interval: readonly [number, number]) => void;
  /** Accepts the remedy of a finding; left out: nothing can be changed. */
  onFix?: (code: string) => void;
  /** The finding whose remedy is being accepted. */
  fixing?: string | null;
}

/** What the intake found: the verdict first, then each finding with its figure, its times and what to do. */
export function HealthCard({ health, onShow, onFix, fixing }: HealthCardProps) {
  const { palette } = useTheme();
  const verdict = VERDICTS[health.verdict];
  const beyond = beyondVerdict(health.sentence, verdict.word);
  return (
    <Card bare>
      <View style={[styles.verdict, { borderLeftColor: palette[verdict.tone] }]}>
        <Text variant="heading" tone={verdict.tone}>
          {capital(verdict.word)}
        </Text>
        {beyond ? <Text>{beyond}</Text> : null}
      </View>
      <View style={[styles.figures, { borderTopColor: palette.rule }]}>
        <Headline
          label="IMU rate"
          value={health.imu.rateHz}
          unit="Hz"
          note={`${count(health.imu.samples)} samples`}
        />
        <Headline
          label="GNSS rate"
          value={health.gnss.rateHz}
          unit="Hz"
          note={`${count(health.gnss.epochs)} fixes`}
        />
        <Headline
          label="IMU gaps"
          value={health.imu.gaps}
          unit=""
          note={health.imu.gaps === 0 ? 'none' : 'marked on the strip'}
        />
      </View>
      {health.findings.map((finding) => (
        <Finding
          key={`${finding.code}-${finding.intervalsS[0]?.[0] ?? ''}`}
          finding={finding}
          onShow={onShow}
          onFix={onFix}
          busy={fixing === finding.code}
        />
      ))}
    </Card>
  );
}

function Headline({
  label,
  value,
  unit,
  note,
}: {
  label: string;
  value: number;
  unit: string;
  note: string;
}) {
  return (
    <View style={styles.headline}>
      <Text variant="label" tone="soft">
        {label}
      </Text>
      <Quantity value={value} unit={unit} size="heading" />
      <Figures variant="small" tone="soft">
        {note}
      </Figures>
    </View>
  );
}

interface FindingProps extends Pick<HealthCardProps, 'onShow' | 'onFix'> {
  finding: HealthFinding;
  busy: boolean;
}

function Finding({ finding, onShow, onFix, busy }: FindingProps) {
  const { palette } = useTheme();
  const { tone, icon, word } = SEVERITIES[finding.severity];
  const first = finding.intervalsS[0];
  return (
    <View style={[styles.finding, { borderTopColor: palette.rule, borderLeftColor: palette[tone] }]}>
      <Icon name={icon} tone={tone} size={20} />
      <View style={styles.words}>
        <Text variant="small" tone={tone} strong>
          {word}
        </Text>
        <Figures variant="body">{finding.sentence}</Figures>
        {finding.intervalsS.length > 0 ? (
          <Figures tone="soft">{`At ${times(finding.intervalsS)}`}</Figures>
        ) : null}
        {finding.remedy ? (
          <Text variant="label" tone="soft">
            {finding.remedy}
          </Text>
        ) : null}
        <View style={finding.fix && onFix ? styles.buttons : styles.show}>
          {finding.fix && onFix ? (
            <Button label={finding.fix.label} icon="check" busy={busy} onPress={() => onFix(finding.code)} />
          ) : null}
          {first && onShow ? (
            <Button
              label="Show on the plots"
              aria-label={`Show on the plots: ${finding.sentence}`}
              kind="plain"
              onPress={() => onShow(first)}
            />
          ) : null}
        </View>
      </View>
      {finding.figure ? (
        <Quantity value={finding.figure.value} unit={finding.figure.unit} size="label" align="right" />
      ) : null}
    </View>
  );
}

/** "7:00–8:00, 13:20 and 12 more" */
export function times(intervals: readonly (readonly [number, number])[], shown = 3): string {
  const named = intervals
    .slice(0, shown)
    .map(([from, to]) => (to - from < 1 ? formatClock(from) : `${formatClock(from)}–${formatClock(to)}`))
    .join(', ');
  const rest = intervals.length - shown;
  return rest > 0 ? `${named} and ${rest} more` : named;
}

const count = (n: number) => n.toLocaleString('en').replaceAll(',', '\u2009');
/** "Usable." adds nothing under the heading "Usable". */
/** What a verdict's sentences say beyond its own word: the heading above them has said that. */
function beyondVerdict(sentences: string, word: string): string {
  const [first, rest] = /^([^.]*\.)\s*(.*)$/s.exec(sentences)?.slice(1) ?? [sentences, ''];
  const repeats =
    first!
      .toLowerCase()
      .replace(/ as it is|usable (?=with)|\./g, '')
      .trim() === word;
  return repeats ? rest! : sentences;
}
const capital = (word: string) => word.charAt(0).toUpperCase() + word.slice(1);

const SEVERITIES: Record<
  Severity,
  { tone: 'petrol' | 'ochre' | 'vermilion'; icon: 'info' | 'warn' | 'stop'; word: string }
> = {
  info: { tone: 'petrol', icon: 'info', word: 'Good to know' },
  warn: { tone: 'ochre', icon: 'warn', word: 'With care' },
  stop: { tone: 'vermilion', icon: 'stop', word: 'Stops its use' },
};

const styles = StyleSheet.create({
  verdict: { padding: space.l, gap: space.xs, borderLeftWidth: 3, borderTopLeftRadius: 5 },
  figures: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    padding: space.l,
    gap: space.l,
    borderTopWidth: hairline,
  },
  headline: { flexGrow: 1, flexBasis: 96, minWidth: 0 },
  finding: {
    flexDirection: 'row',
    gap: space.m,
    padding: space.l,
    borderTopWidth: hairline,
    borderLeftWidth: 3,
  },
  words: { flex: 1, gap: 2 },
  show: { flexDirection: 'row', marginLeft: -space.l },
  buttons: { flexDirection: 'row', flexWrap: 'wrap', gap: space.s, paddingTop: space.xs },
});
