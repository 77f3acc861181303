import { useEffect, useRef, useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { Text } from '@/components/ui/Text';
import { web } from '@/components/ui/web-props';
import { fonts, space, touchTarget } from '@/constants/theme';
import { useDisplayUnits } from '@/hooks/preferences';
import { displayUnit } from '@/shared/display-units';
import { formatChange, formatNumber } from '@/shared/format';
import { toDisplay, type DisplayUnit } from '@/shared/units';
import type { SliderSpec } from '@/shared/parameters/parameter-specs';
import { RulerDrawing, RULER_INSET_PX } from './RulerDrawing';
import { bindSliderGestures } from './slider-gestures';
import { fractionOf, sliderKey, valueAt } from './slider-model';
import { TypedQuantity } from './TypedQuantity';

export interface RuledSliderProps {
  spec: SliderSpec;
  /** SI, as all values here. */
  value: number;
  /** Where double tap returns to, marked on the rule. */
  baseline: number;
  /** The default or datasheet value, marked by a triangle. */
  reference: number;
  unit?: DisplayUnit;
  /** `settled` is false while the thumb still moves. */
  onChange: (value: number, settled: boolean) => void;
  /** Why it cannot be moved; left out: it can. */
  locked?: string;
}

/** A ruled logarithmic slider: drag, tap, keys, typed value with unit; double tap returns to the baseline. */
export function RuledSlider({ spec, value, baseline, reference, unit, onChange, locked }: RuledSliderProps) {
  const chosen = useDisplayUnits();
  const shownUnit = unit ?? displayUnit(spec.quantity, chosen);
  const [width, setWidth] = useState(0);
  const rulerPx = useBreakpoint().wide ? 36 : touchTarget;
  const rule = useSliderSurface({ spec, value, baseline, unit: shownUnit, onChange, locked, width });
  const shown = toDisplay(value, shownUnit);
  const change = shown - toDisplay(baseline, shownUnit);
  const text = `${formatNumber(shown)} ${shownUnit.symbol}`;
  return (
    <View style={styles.slider}>
      <View style={styles.head}>
        <Text variant="label" strong style={styles.label}>
          {spec.label}
        </Text>
        <TypedQuantity
          label={spec.label}
          value={value}
          quantity={spec.quantity}
          unit={shownUnit}
          range={spec.range}
          onValue={(next) => onChange(next, true)}
          locked={locked}
        />
      </View>
      <View
        ref={rule}
        role="slider"
        aria-label={`${spec.label}, ${groupWords[spec.group]}`}
        aria-valuemin={toDisplay(spec.range.low, shownUnit)}
        aria-valuemax={toDisplay(spec.range.high, shownUnit)}
        aria-valuenow={shown}
        aria-valuetext={text}
        aria-disabled={locked !== undefined}
        onLayout={(event) => setWidth(Math.floor(event.nativeEvent.layout.width))}
        {...web({
          tabIndex: 0,
          onKeyDown: (event) => {
            if (locked !== undefined) return;
            const next = sliderKey(value, spec.range, shownUnit, event.key, event.shiftKey, baseline);
            if (next === null) return;
            event.preventDefault();
            if (next !== value) onChange(next, true);
          },
        })}
        style={[styles.rule, { height: rulerPx }]}
      >
        {width > 0 ? (
          <RulerDrawing
            width={width}
            range={spec.range}
            unit={shownUnit}
            value={value}
            baseline={baseline}
            reference={reference}
            locked={locked !== undefined}
            height={rulerPx}
          />
        ) : null}
      </View>
      <View style={styles.head}>
        <Text variant="small" tone="soft" style={styles.more}>
          {spec.more}
        </Text>
        <Text variant="small" tone="soft" style={styles.change}>
          {Math.abs(change) <= 1e-9 * Math.abs(shown) ? '±0' : formatChange(change, 2)}
          <Text variant="small" tone="soft">{`\u202f${shownUnit.symbol}`}</Text>
        </Text>
      </View>
    </View>
  );
}

const groupWords = { gyro: 'gyro', accel: 'accelerometer', gnss: 'GNSS', gate: 'gate' } as const;

interface SurfaceInput {
  spec: SliderSpec;
  value: number;
  baseline: number;
  unit: DisplayUnit;
  onChange: (value: number, settled: boolean) => void;
  locked?: string;
  width: number;
}

function useSliderSurface(input: SurfaceInput) {
  const rule = useRef<View>(null);
  const latest = useRef(input);
  useEffect(() => {
    latest.current = input;
  });
  useEffect(() => {
    const element = rule.current as unknown as HTMLElement | null;
    if (!element?.addEventListener) return;
    return bindSliderGestures(element, {
      locked: () => latest.current.locked !== undefined,
      fraction: () => fractionOf(latest.current.value, latest.current.spec.range),
      span: () => ({ left: RULER_INSET_PX, right: latest.current.width - RULER_INSET_PX }),
      change: (fraction, settled) => {
        const { spec, unit, value, onChange } = latest.current;
        const next = valueAt(fraction, spec.range, unit);
        if (next !== value || settled) onChange(next, settled);
      },
      reset: () => latest.current.onChange(latest.current.baseline, true),
    });
  }, []);
  return rule;
}

const styles = StyleSheet.create({
  slider: { paddingTop: 2, paddingBottom: space.s },
  head: { flexDirection: 'row', alignItems: 'center', justifyContent: 'space-between', gap: space.s },
  label: { flexShrink: 1 },
  more: { flexShrink: 1 },
  change: { fontFamily: fonts.number, textAlign: 'right' },
  rule: { userSelect: 'none' },
});
