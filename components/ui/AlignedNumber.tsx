import { fonts, typeScale } from '@/constants/theme';
import { formatChange, formatNumber } from '@/shared/format';
import { Text, type Tone } from './Text';

export interface AlignedNumberProps {
  value: number | null;
  digits?: number;
  tone?: Tone;
  /** Shows the sign of a positive value as well. */
  signed?: boolean;
}

/** A number of a table's column: set in the mono face and padded, so that the decimal points of all rows stand under each other. */
export function AlignedNumber({ value, digits = 3, tone = 'ink', signed }: AlignedNumberProps) {
  const text = value === null ? '–' : signed ? formatChange(value, digits) : formatNumber(value, digits);
  return (
    <Text
      variant="label"
      tone={tone}
      numberOfLines={1}
      style={{ fontFamily: fonts.number, fontSize: typeScale.label }}
    >
      {alignDecimal(text)}
    </Text>
  );
}

/** `text` padded so that its decimal point is the (WHOLE + 1)th character. */
export function alignDecimal(text: string): string {
  const point = text.includes('e') ? -1 : text.indexOf('.');
  const whole = point < 0 ? text.length : point;
  return '\u00a0'.repeat(Math.max(0, WHOLE - whole)) + text;
}

const WHOLE = 4;
