import { View, type TextStyle } from 'react-native';
import { fonts, space, typeScale } from '@/constants/theme';
import { formatChange, formatNumber } from '@/shared/format';
import { Text, type Tone } from './Text';

export interface QuantityProps {
  /** In the unit shown; null or NaN reads as a dash. */
  value: number | null;
  unit: string;
  digits?: number;
  /** 1σ or another ± beside the value, in the same unit. */
  uncertainty?: number;
  /** Shows the change against it, with its sign. */
  baseline?: number | null;
  /** What the change is against, for people and for the screen reader. */
  baselineName?: string;
  tone?: Tone;
  size?: 'small' | 'label' | 'body' | 'heading' | 'title';
  align?: 'left' | 'right';
}

/** A measured number: digits in Azeret Mono, then its unit in small. */
export function Quantity({
  value,
  unit,
  digits = 3,
  uncertainty,
  baseline,
  baselineName = 'baseline',
  tone = 'ink',
  size = 'body',
  align = 'left',
}: QuantityProps) {
  const known = value !== null && Number.isFinite(value);
  const digitsStyle: TextStyle = {
    fontFamily: fonts.number,
    fontSize: typeScale[size],
    lineHeight: lines[size],
  };
  const unitSize = size === 'small' || size === 'label' ? 'small' : 'label';
  return (
    <View style={{ alignItems: align === 'right' ? 'flex-end' : 'flex-start' }}>
      <Text tone={tone} style={digitsStyle}>
        {known ? formatNumber(value, digits) : '–'}
        {known && uncertainty !== undefined ? ` ± ${formatNumber(uncertainty, 2)}` : null}
        {unit ? (
          <Text variant={unitSize} tone="soft" style={{ lineHeight: lines[size] }}>
            {`${NARROW_SPACE}${unit}`}
          </Text>
        ) : null}
      </Text>
      {known && baseline !== undefined && baseline !== null ? (
        <Text variant="small" tone="soft" style={{ marginTop: space.xs / 2 }}>
          <Text variant="small" tone="soft" style={{ fontFamily: fonts.number }}>
            {formatChange(value - baseline, digits)}
          </Text>
          {` against ${baselineName}`}
        </Text>
      ) : null}
    </View>
  );
}

const NARROW_SPACE = '\u202f';
const lines = { small: 16, label: 20, body: 24, heading: 26, title: 34 } as const;
