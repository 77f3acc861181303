import { View } from 'react-native';
import { Choice, type ChoiceOption } from '@/components/ui/Choice';
import { space } from '@/constants/theme';
import { NumberSetting } from './NumberSetting';
import { readPath } from './parameter-path';
import type { ParameterGroup } from './parameter-specs';
import type { Bench } from './use-bench';

/** Settings of a group that are chosen or typed rather than slid. */
export function AdvancedSettings({ bench, group }: { bench: Bench; group: ParameterGroup }) {
  switch (group) {
    case 'gyro':
    case 'accel':
      return (
        <Setting
          bench={bench}
          path={`${group}.biasModel`}
          label="Bias model"
          options={[
            { value: 'turn-on-plus-wander', label: 'Turn-on constant plus wander' },
            { value: 'gauss-markov', label: 'Gauss–Markov, zero mean' },
            { value: 'random-walk', label: 'Random walk' },
          ]}
        />
      );
    case 'gnss':
      return <GnssSettings bench={bench} />;
    case 'gate':
      return <FilterSettings bench={bench} />;
  }
}

function GnssSettings({ bench }: { bench: Bench }) {
  return (
    <View style={{ gap: space.m }}>
      <Setting bench={bench} path="gnss.usePosition" label="Position" options={USED} />
      <Setting bench={bench} path="gnss.useVelocity" label="Velocity" options={USED} />
      <Setting
        bench={bench}
        path="gnss.sigmaSource"
        label="Accuracies from"
        options={[
          { value: 'receiver', label: 'the receiver' },
          { value: 'fixed', label: 'the fixed values below' },
        ]}
      />
      <NumberSetting
        bench={bench}
        path="gnss.latencyS"
        label="Latency of fixes"
        unit="s"
        range={[-5, 5]}
        hint="positive: a fix speaks of an earlier moment than its stamp"
      />
    </View>
  );
}

function FilterSettings({ bench }: { bench: Bench }) {
  return (
    <View style={{ gap: space.m }}>
      <NumberSetting
        bench={bench}
        path="initial.headingDeg"
        label="Initial heading"
        unit="°"
        range={[-360, 360]}
        optional="from the course"
        hint="left empty: taken from the GNSS course"
      />
      <NumberSetting
        bench={bench}
        path="initial.courseSpeedMPerS"
        label="Course counts as heading above"
        unit="m/s"
        range={[0.1, 100]}
      />
      <Setting
        bench={bench}
        path="mechanisation.covarianceIntervalS"
        label="Covariance is propagated"
        options={[
          { value: '0', label: 'at every sample' },
          { value: '0.01', label: '100 times a second' },
          { value: '0.05', label: '20 times a second' },
          { value: '0.1', label: '10 times a second' },
          { value: '0.2', label: '5 times a second' },
        ]}
      />
      <Setting
        bench={bench}
        path="mechanisation.scheme"
        label="Mechanisation"
        options={[
          { value: 'coning-sculling', label: 'Coning and sculling corrected' },
          { value: 'trapezoidal', label: 'Trapezoidal, for study' },
          { value: 'rectangular', label: 'Rectangular, for study' },
        ]}
      />
    </View>
  );
}

const USED: readonly ChoiceOption<string>[] = [
  { value: 'true', label: 'used' },
  { value: 'false', label: 'not used' },
];

function Setting({
  bench,
  path,
  label,
  options,
}: {
  bench: Bench;
  path: string;
  label: string;
  options: readonly ChoiceOption<string>[];
}) {
  const value = readPath(bench.config.parameters, path);
  const text = String(value);
  const known = options.some((option) => option.value === text);
  return (
    <Choice
      label={label}
      shape="select"
      value={text}
      options={known ? options : [...options, { value: text, label: text }]}
      onChange={(next) =>
        bench.setParameter(
          path,
          typeof value === 'number' ? Number(next) : typeof value === 'boolean' ? next === 'true' : next,
          true,
        )
      }
      disabled={bench.locked !== null}
    />
  );
}
