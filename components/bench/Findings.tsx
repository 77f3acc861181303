import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Figures } from '@/components/ui/Figures';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, radius, space, type Palette } from '@/constants/theme';
import { formatClock } from '@/shared/format';
import type { RunFinding } from '@/shared/contracts/runs';
import { useSummary, type Bench } from './use-bench';

/** What the run says in plain words, each with the change that it suggests. */
export function Findings({ bench }: { bench: Bench }) {
  const { palette } = useTheme();
  const summary = useSummary(bench);
  const findings = summary?.findings ?? [];
  const warnings = summary?.warnings ?? [];
  return (
    <View
      role="region"
      aria-label="Findings"
      style={[styles.card, { backgroundColor: palette.sheet, borderColor: palette.rule }]}
    >
      <Text variant="small" strong tone="soft" level={2} style={styles.title}>
        FINDINGS
      </Text>
      {summary === null ? (
        <Text variant="label" tone="soft" style={styles.none}>
          They appear when the first run is done.
        </Text>
      ) : findings.length + warnings.length === 0 ? (
        <Text variant="label" tone="soft" style={styles.none}>
          Nothing to say: the sample is too small, or all is as it should be.
        </Text>
      ) : null}
      {findings.map((finding, i) => (
        <FindingView key={`${finding.code}${i}`} bench={bench} finding={finding} />
      ))}
      {warnings.map((warning, i) => (
        <FindingView
          key={`warning${i}`}
          bench={bench}
          finding={{
            code: warning.code,
            severity: 'info',
            title: '',
            sentence: warning.sentence,
            suggestion: null,
            intervalS: warning.timeS === null ? null : [warning.timeS, warning.timeS],
          }}
        />
      ))}
    </View>
  );
}

function FindingView({ bench, finding }: { bench: Bench; finding: RunFinding }) {
  const { palette } = useTheme();
  const { suggestion, intervalS } = finding;
  return (
    <View
      style={[styles.finding, { borderTopColor: palette.rule, borderLeftColor: ruleOf(finding, palette) }]}
    >
      {finding.title ? (
        <Text variant="label" strong level={3}>
          {finding.title}
        </Text>
      ) : null}
      <Figures variant="label" tone="soft">
        {finding.sentence}
      </Figures>
      <View style={styles.actions}>
        {suggestion && bench.locked === null ? (
          <Button
            label={suggestion.label}
            kind="plain"
            onPress={() => bench.setParameter(suggestion.path, suggestion.value, true)}
          />
        ) : null}
        {intervalS ? (
          <Button
            label={`Show at ${formatClock(intervalS[0])}`}
            kind="plain"
            onPress={() => showInterval(bench, intervalS)}
          />
        ) : null}
      </View>
    </View>
  );
}

/** Puts the interval in the middle of all charts, with as much again around it. */
function showInterval({ group }: Bench, [fromS, toS]: readonly [number, number]): void {
  const margin = Math.max(5, toS - fromS);
  group.viewport.show([fromS - margin, toS + margin]);
  group.cursor.set(fromS);
}

const ruleOf = ({ severity }: RunFinding, palette: Palette) =>
  ({ stop: palette.vermilion, warn: palette.ochre, info: palette.ghost, good: palette.pine })[severity];

const styles = StyleSheet.create({
  card: { borderWidth: hairline, borderRadius: radius, overflow: 'hidden' },
  title: { padding: space.m, letterSpacing: 1 },
  none: { paddingHorizontal: space.m, paddingBottom: space.m },
  finding: {
    borderTopWidth: hairline,
    borderLeftWidth: 3,
    paddingHorizontal: space.m,
    paddingTop: space.s,
    gap: 2,
  },
  actions: { flexDirection: 'row', flexWrap: 'wrap', marginLeft: -space.l, minHeight: space.s },
});
