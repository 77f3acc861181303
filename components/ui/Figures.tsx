import { Fragment } from 'react';
import { fonts } from '@/constants/theme';
import { Text, type TextProps } from './Text';

export interface FiguresProps extends Omit<TextProps, 'children'> {
  children: string;
}

/** A line in which the digits stand in the mono face and the words beside them do not: "20 min 40 s". */
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

/** Cuts a line into runs of digits and of everything else. */
export function splitFigures(line: string): { text: string; figure: boolean }[] {
  return line
    .split(/([−+-]?\d[\d.,:\u2009]*)/)
    .filter((text) => text !== '')
    .map((text) => ({ text, figure: /\d/.test(text) }));
}

/** The mono face runs wider, so that it is set a little smaller beside words. */
const mono = { title: 26, heading: 18, body: 15, label: 13, small: 11 } as const;
