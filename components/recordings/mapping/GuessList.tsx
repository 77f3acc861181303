import { StyleSheet, View } from 'react-native';
import { Figures } from '@/components/ui/Figures';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space } from '@/constants/theme';
import type { ChannelGuess } from '@/shared/contracts/recordings';
import { Fold } from '@/components/ui/Fold';

/** Below it a person should look. */
export const SURE = 0.7;

/** What the columns were taken for and why; what is not sure stands first and open. */
export function GuessList({ guesses }: { guesses: readonly ChannelGuess[] }) {
  const doubtful = guesses.filter(({ confidence }) => confidence < SURE);
  const sure = guesses.filter(({ confidence }) => confidence >= SURE);
  if (guesses.length === 0) return null;
  return (
    <View role="group" aria-label="How the columns were taken" style={{ gap: space.s }}>
      {doubtful.map((guess) => (
        <Guess key={keyOf(guess)} guess={guess} />
      ))}
      {sure.length > 0 ? (
        <Fold title={`Taken without doubt: ${sure.map(({ channel }) => channel).join(', ')}`}>
          {sure.map((guess) => (
            <Guess key={keyOf(guess)} guess={guess} />
          ))}
        </Fold>
      ) : null}
    </View>
  );
}

const keyOf = ({ channel, columns }: ChannelGuess) => `${channel}-${columns.join()}`;

function Guess({ guess }: { guess: ChannelGuess }) {
  const { palette } = useTheme();
  const doubtful = guess.confidence < SURE;
  return (
    <View style={[styles.guess, { borderLeftColor: doubtful ? palette.ochre : palette.rule }]}>
      <View style={styles.head}>
        {doubtful ? (
          <Text variant="label" strong tone="ochre">
            check
          </Text>
        ) : null}
        <Text variant="label" strong style={styles.words}>
          {`${capital(guess.channel)}: ${guess.columns.join(', ')}, taken as ${written(guess.takenAs)}`}
        </Text>
      </View>
      <Figures tone="soft">{guess.reason}</Figures>
    </View>
  );
}

const capital = (word: string) => word.charAt(0).toUpperCase() + word.slice(1);

/** Units as people write them. */
const written = (unit: string) =>
  unit
    .replace('m/s^2', 'm/s²')
    .replace(/\bdeg\b/g, '°')
    .replace('*', '·');

const styles = StyleSheet.create({
  guess: { borderLeftWidth: hairline * 3, paddingLeft: space.m, paddingVertical: 2 },
  head: { flexDirection: 'row', gap: space.s, alignItems: 'baseline' },
  words: { flexShrink: 1 },
});
