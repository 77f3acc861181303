import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { Figures } from '@/components/ui/Figures';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space } from '@/constants/theme';
import type { IntakeProblem } from '@/shared/contracts/recordings';
import { FILE_ROLE } from './status';

export interface ProblemsCardProps {
  title: string;
  tone: 'vermilion' | 'ochre';
  problems: readonly IntakeProblem[];
  /** Accepts the remedy of a problem that offers one. */
  onFix?: (code: string) => void;
  /** Code of the one that is being accepted. */
  fixing?: string | null;
  children?: React.ReactNode;
}

/** Why the files could not be used: what, in which line and column, and what to do. */
export function ProblemsCard({ title, tone, problems, onFix, fixing, children }: ProblemsCardProps) {
  const { palette } = useTheme();
  return (
    <Card bare style={{ borderLeftWidth: 3, borderLeftColor: palette[tone] }}>
      <View style={styles.head}>
        <Text variant="heading" tone={tone}>
          {title}
        </Text>
      </View>
      {problems.map((problem, at) => (
        <View key={at} style={[styles.problem, { borderTopColor: palette.rule }]}>
          <ProblemWords problem={problem} />
          {problem.fix && onFix ? (
            <View style={styles.fix}>
              <Button
                label={problem.fix.label}
                kind="primary"
                icon="check"
                busy={fixing === problem.code}
                onPress={() => onFix(problem.code)}
              />
            </View>
          ) : null}
        </View>
      ))}
      {children ? <View style={[styles.problem, { borderTopColor: palette.rule }]}>{children}</View> : null}
    </Card>
  );
}

/** Where, what, and what to do. */
export function ProblemWords({ problem }: { problem: IntakeProblem }) {
  const place = placeOf(problem);
  return (
    <>
      {place ? (
        <Figures strong tone="soft">
          {place}
        </Figures>
      ) : null}
      <Figures variant="body">{problem.message}</Figures>
      <Text variant="label" tone="soft">
        {problem.remedy}
      </Text>
    </>
  );
}

/** "IMU file · line 12 · column gyro_x" */
export function placeOf(problem: IntakeProblem): string {
  return [
    problem.file ? `${FILE_ROLE[problem.file]} file` : null,
    problem.line === null ? null : `line ${problem.line}`,
    problem.column === null ? null : `column ${problem.column}`,
  ]
    .filter(Boolean)
    .join(' · ');
}

const styles = StyleSheet.create({
  head: { padding: space.l },
  fix: { flexDirection: 'row', flexWrap: 'wrap', paddingTop: space.s },
  problem: { padding: space.l, gap: space.xs, borderTopWidth: hairline },
});
