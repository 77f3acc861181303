import { Fragment } from 'react';
import { StyleSheet } from 'react-native';
import { fonts } from '@/constants/theme';
import { Text, type TextProps } from './Text';

export interface FiguresProps extends Omit<TextProps, 'children'> {
  children: string;
}

/** A line in which measured numbers stand in the mono face; words, counts, clocks and lengths of time in words do not. */
export function Figures({ children, variant = 'label', ...rest }: FiguresProps) {
  return (
    <Text variant={variant} {...rest}>
      {splitFigures(children).map((part, i) =>
        part.figure ? (
          <Text
            key={i}
            variant={variant}
            {...rest}
            style={[rest.style, styles.figure, { fontSize: mono[variant] }]}
          >
            {part.text}
          </Text>
        ) : (
          <Fragment key={i}>{part.text}</Fragment>
        ),
      )}
    </Text>
  );
}

/** Cuts a line at its measured numbers: those that a unit follows. "20 min 40 s" is told, not measured. */
export function splitFigures(line: string): { text: string; figure: boolean }[] {
  return line
    .split(MEASURED)
    .map((text, at) => ({ text, figure: at % 2 === 1 }))
    .filter(({ text }) => text !== '');
}

const UNITS = 's|ms|µs|Hz|kHz|B|kB|MB|GB|TB|%|°|rad|mm|m|km|g|mg|µg|kn|σ|×';
const MEASURED = new RegExp(
  `((?<!min |\\d)[−+-]?\\d[\\d.\\u2009]*)(?=[ \\u00a0\\u202f](?:${UNITS})(?![a-z]))`,
);

/** The mono face runs wider, so that it is set a little smaller and closer beside words. */
const mono = { title: 26, heading: 18, body: 15, label: 13, small: 11 } as const;

const styles = StyleSheet.create({ figure: { fontFamily: fonts.number, letterSpacing: -0.7 } });
