import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Figures } from '@/components/ui/Figures';
import { Icon } from '@/components/ui/Icon';
import { useTheme } from '@/components/ui/ThemeProvider';
import { space } from '@/constants/theme';
import type { ChannelMap, HealthFinding, IntakeProblem } from '@/shared/contracts/recordings';
import { ProblemWords } from '../ProblemsCard';

/** Changes the form: the parts that take the place of those in it, and what the button said. */
export type TakeMap = (parts: ChannelMap, label: string) => void;

/** What the first rows show against the map; a remedy is a button that changes the form. */
export function PreviewFindings({ findings, onTake }: { findings: HealthFinding[]; onTake: TakeMap }) {
  return (
    <>
      {findings.map((finding) => (
        <Ruled key={finding.code} tone={finding.severity === 'stop' ? 'vermilion' : 'ochre'}>
          <Figures variant="body">{finding.sentence}</Figures>
          {finding.fix ? (
            <View style={styles.buttons}>
              <Button
                label={finding.fix.label}
                icon="check"
                onPress={() => onTake(finding.fix!.map, finding.fix!.label)}
              />
            </View>
          ) : finding.remedy ? (
            <Figures tone="soft">{finding.remedy}</Figures>
          ) : null}
        </Ruled>
      ))}
    </>
  );
}

/** Why the first rows cannot be read with this map: where, what, and what to do. */
export function PreviewProblems({ problems }: { problems: IntakeProblem[] }) {
  return (
    <>
      {problems.map((problem, at) => (
        <Ruled key={at} tone="vermilion">
          <ProblemWords problem={problem} />
        </Ruled>
      ))}
    </>
  );
}

function Ruled({ tone, children }: { tone: 'vermilion' | 'ochre'; children: React.ReactNode }) {
  const { palette } = useTheme();
  return (
    <View style={[styles.ruled, { borderLeftColor: palette[tone] }]}>
      <Icon name={tone === 'vermilion' ? 'stop' : 'warn'} tone={tone} size={20} />
      <View style={styles.words}>{children}</View>
    </View>
  );
}

const styles = StyleSheet.create({
  ruled: { flexDirection: 'row', gap: space.s, borderLeftWidth: 3, paddingLeft: space.m },
  words: { flex: 1, minWidth: 0, gap: space.xs },
  buttons: { flexDirection: 'row', flexWrap: 'wrap', paddingTop: space.xs },
});
