import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space } from '@/constants/theme';
import { defaultParameters } from '@/shared/contracts/parameters';
import { AdvancedSettings } from './AdvancedSettings';
import { aidWords } from './AidSettings';
import { GateChoice } from './GateChoice';
import { readNumber } from '@/shared/parameters/parameter-path';
import {
  GROUP_TITLES,
  SLIDERS,
  type ParameterGroup,
  type SliderSpec,
} from '@/shared/parameters/parameter-specs';
import { RuledSlider } from './RuledSlider';
import { SensorPresets } from './SensorPresets';
import type { Bench } from './use-bench';

const DEFAULTS = defaultParameters();

export interface ParameterPanelProps {
  bench: Bench;
  /** One group alone (the phone's tabs); left out: all, each under its name. */
  group?: ParameterGroup;
}

/** Sliders of all groups, the rarely touched ones folded away. */
export function ParameterPanel({ bench, group }: ParameterPanelProps) {
  const groups: readonly ParameterGroup[] = group ? [group] : ['gyro', 'accel', 'gnss', 'gate', 'aids'];
  return (
    <View>
      {groups.map((one) => (
        <Group key={one} bench={bench} group={one} titled={group === undefined} />
      ))}
    </View>
  );
}

function Group({ bench, group, titled }: { bench: Bench; group: ParameterGroup; titled: boolean }) {
  const { palette } = useTheme();
  // On the phone the aids have a tab of their own, in which nothing else stands.
  const [open, setOpen] = useState(group === 'aids' && !titled);
  const counting = SLIDERS.filter(
    (spec) => spec.group === group && (spec.counts?.(bench.config.parameters) ?? true),
  );
  const ruled = { borderTopColor: palette.rule };
  return (
    <View
      role="region"
      aria-label={`${GROUP_TITLES[group]} parameters`}
      style={[styles.group, titled ? [styles.ruled, ruled] : null]}
    >
      {titled ? (
        <Text variant="small" strong tone="soft" level={2} style={styles.title}>
          {GROUP_TITLES[group].toUpperCase()}
        </Text>
      ) : null}
      {group === 'gate' ? <GateChoice bench={bench} /> : null}
      {group === 'gyro' || group === 'accel' ? <SensorPresets bench={bench} sensor={group} /> : null}
      {group === 'aids' && titled ? (
        <Text variant="label" tone="soft" style={styles.state}>
          {aidWords(bench.config.parameters)}
        </Text>
      ) : null}
      {counting
        .filter((spec) => !spec.advanced)
        .map((spec, i) => (
          <View key={spec.path} style={i > 0 ? [styles.row, ruled] : styles.row}>
            <ParameterSlider bench={bench} spec={spec} />
          </View>
        ))}
      {group === 'aids' && !titled ? null : (
        <View style={styles.more}>
          <Button
            label={open ? 'Fewer settings' : 'More settings'}
            icon={open ? 'up' : 'down'}
            kind="plain"
            aria-expanded={open}
            aria-label={`${open ? 'Fewer' : 'More'} ${GROUP_TITLES[group]} settings`}
            onPress={() => setOpen(!open)}
          />
        </View>
      )}
      {open ? (
        <View style={styles.advanced}>
          <AdvancedSettings bench={bench} group={group} />
          {counting
            .filter((spec) => spec.advanced)
            .map((spec) => (
              <View key={spec.path} style={[styles.row, ruled]}>
                <ParameterSlider bench={bench} spec={spec} />
              </View>
            ))}
        </View>
      ) : null}
    </View>
  );
}

function ParameterSlider({ bench, spec }: { bench: Bench; spec: SliderSpec }) {
  return (
    <RuledSlider
      spec={spec}
      value={readNumber(bench.config.parameters, spec.path)}
      baseline={readNumber(bench.baseline.parameters, spec.path)}
      reference={readNumber(DEFAULTS, spec.path)}
      onChange={(value, settled) => bench.setParameter(spec.path, value, settled)}
      locked={bench.locked ?? undefined}
    />
  );
}

const styles = StyleSheet.create({
  ruled: { borderTopWidth: hairline },
  group: { paddingBottom: space.xs, alignItems: 'stretch' },
  title: { paddingTop: space.m, letterSpacing: 1 },
  row: { borderTopWidth: 0 },
  state: { paddingTop: space.xs },
  more: { alignItems: 'flex-start', marginLeft: -space.l },
  advanced: { gap: space.m, paddingBottom: space.m },
});
