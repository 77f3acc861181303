import { useWatch, type Control } from 'react-hook-form';
import { StyleSheet, View } from 'react-native';
import { FormChoice } from '@/components/forms/FormChoice';
import { FormNumber } from '@/components/forms/FormNumber';
import { space } from '@/constants/theme';
import type { RequirementForm } from './requirement-form';
import {
  AXES,
  DRIFT_QUANTITIES,
  GROUPS,
  KINDS,
  RMSE_QUANTITIES,
  SENSORS,
  STATISTICS,
  WHENS,
} from './requirement-words';

/** Which metric, and what it needs to be told. */
export function MetricFields({ control }: { control: Control<RequirementForm> }) {
  const kind = useWatch({ control, name: 'kind' });
  return (
    <>
      <FormChoice control={control} name="kind" label="Metric" shape="select" options={KINDS} />
      <View style={styles.row}>
        <Details control={control} kind={kind} />
      </View>
    </>
  );
}

function Details({ control, kind }: { control: Control<RequirementForm>; kind: RequirementForm['kind'] }) {
  switch (kind) {
    case 'drift':
      return (
        <>
          <View style={styles.part}>
            <FormChoice
              control={control}
              name="driftQuantity"
              label="Of"
              shape="select"
              options={DRIFT_QUANTITIES}
            />
          </View>
          <View style={styles.part}>
            <FormNumber control={control} name="afterS" label="After" unit="s" required />
          </View>
          <View style={styles.part}>
            <FormChoice
              control={control}
              name="statistic"
              label="Over all windows"
              shape="select"
              options={STATISTICS}
            />
          </View>
        </>
      );
    case 'attitude-sigma':
      return (
        <>
          <View style={styles.part}>
            <FormChoice control={control} name="axis" label="Angle" shape="select" options={AXES} />
          </View>
          <View style={styles.part}>
            <FormChoice control={control} name="when" label="Taken" shape="select" options={WHENS} />
          </View>
        </>
      );
    case 'bias-convergence':
      return <Convergence control={control} />;
    case 'rmse':
      return (
        <View style={styles.part}>
          <FormChoice
            control={control}
            name="rmseQuantity"
            label="Of"
            shape="select"
            options={RMSE_QUANTITIES}
          />
        </View>
      );
    default:
      return (
        <View style={styles.part}>
          <FormChoice control={control} name="group" label="Of" shape="select" options={GROUPS} />
        </View>
      );
  }
}

function Convergence({ control }: { control: Control<RequirementForm> }) {
  const sensor = useWatch({ control, name: 'sensor' });
  return (
    <>
      <View style={styles.part}>
        <FormChoice control={control} name="sensor" label="Sensor" shape="select" options={SENSORS} />
      </View>
      <View style={styles.part}>
        <FormNumber
          control={control}
          name="sigma"
          label="1σ stays below"
          unit={sensor === 'gyro' ? 'rad/s' : 'm/s²'}
          required
        />
      </View>
    </>
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', flexWrap: 'wrap', gap: space.m },
  part: { flexGrow: 1, flexBasis: 160, minWidth: 0 },
});
