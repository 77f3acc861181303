import { View } from 'react-native';
import type { ChoiceOption } from '@/components/ui/Choice';
import { space } from '@/constants/theme';
import { AidSettings } from './AidSettings';
import { ChoiceSetting } from './ChoiceSetting';
import { NumberSetting } from './NumberSetting';
import { fieldAt } from '@/shared/parameters/parameter-fields';
import type { ParameterGroup } from '@/shared/parameters/parameter-specs';
import type { Bench } from './use-bench';

/** Settings of a group that are chosen or typed rather than slid. */
export function AdvancedSettings({ bench, group }: { bench: Bench; group: ParameterGroup }) {
  switch (group) {
    case 'gyro':
    case 'accel':
      return (
        <ChoiceSetting
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
    case 'aids':
      return <AidSettings bench={bench} />;
  }
}

function GnssSettings({ bench }: { bench: Bench }) {
  return (
    <View style={{ gap: space.m }}>
      <ChoiceSetting bench={bench} path="gnss.usePosition" label="Position" options={USED} />
      <ChoiceSetting bench={bench} path="gnss.useVelocity" label="Velocity" options={USED} />
      <ChoiceSetting
        bench={bench}
        path="gnss.sigmaSource"
        label="Accuracies from"
        options={[
          { value: 'receiver', label: 'the receiver' },
          { value: 'fixed', label: 'the fixed values below' },
        ]}
      />
      <NumberSetting bench={bench} field={fieldAt('gnss.positionInflation')} />
      <NumberSetting bench={bench} field={fieldAt('gnss.velocityInflation')} />
      <NumberSetting bench={bench} field={fieldAt('gnss.latencyS')} />
    </View>
  );
}

function FilterSettings({ bench }: { bench: Bench }) {
  return (
    <View style={{ gap: space.m }}>
      <NumberSetting bench={bench} field={fieldAt('initial.headingDeg')} />
      <NumberSetting bench={bench} field={fieldAt('initial.courseSpeedMPerS')} />
      <ChoiceSetting
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
      <ChoiceSetting
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
