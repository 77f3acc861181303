import { Fragment } from 'react';
import { fonts } from '@/constants/theme';
import { Text, type TextProps } from './Text';

export interface FiguresProps extends Omit<TextProps, 'children'> {
  children: string;
}

/** A line in which measured numbers stand in the mono face and words, counts and clocks do not: "20 min 40 s". */
export function Figures({ children, variant = 'label', ...rest }: FiguresProps) {
  return (
    <Text variant={variant} {...rest}>
      {splitFigures(children).map((part, i) =>
        part.figure ? (
          <Text
            key={i}
            variant={variant}
            {...rest}
            style={[rest.style, { fontFamily: fonts.number, fontSize: mono[variant] }]}
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

/** Cuts a line at its measured numbers: those that a unit follows. */
export function splitFigures(line: string): { text: string; figure: boolean }[] {
  return line
    .split(MEASURED)
    .map((text, at) => ({ text, figure: at % 2 === 1 }))
    .filter(({ text }) => text !== '');
}

const UNITS = 's|ms|µs|min|h|Hz|kHz|B|kB|MB|GB|TB|%|°|rad|mm|m|km|g|mg|µg|kn|σ|×';
const MEASURED = new RegExp(`([−+-]?\\d[\\d.\\u2009]*)(?=[ \\u00a0\\u202f](?:${UNITS})(?![a-z]))`);

/** The mono face runs wider, so that it is set a little smaller beside words. */
const mono = { title: 26, heading: 18, body: 15, label: 13, small: 11 } as const;
