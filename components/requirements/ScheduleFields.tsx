import { useWatch, type Control } from 'react-hook-form';
import { StyleSheet, View } from 'react-native';
import { FormChoice } from '@/components/forms/FormChoice';
import { FormField } from '@/components/forms/FormField';
import { FormNumber } from '@/components/forms/FormNumber';
import { space } from '@/constants/theme';
import type { RequirementForm } from './requirement-form';
import { SCHEDULES } from './requirement-words';

/** When GNSS is cut in the runs that the requirement is judged by. */
export function ScheduleFields({ control }: { control: Control<RequirementForm> }) {
  const schedule = useWatch({ control, name: 'schedule' });
  return (
    <>
      <FormChoice control={control} name="schedule" label="Outages" shape="segments" options={SCHEDULES} />
      {schedule === 'every' ? (
        <View style={styles.row}>
          <View style={styles.part}>
            <FormNumber control={control} name="everyS" label="Every" unit="s" required />
          </View>
          <View style={styles.part}>
            <FormNumber control={control} name="forS" label="For" unit="s" required />
          </View>
          <View style={styles.part}>
            <FormNumber
              control={control}
              name="firstAfterS"
              label="First, after the alignment"
              unit="s"
              required
            />
          </View>
        </View>
      ) : null}
      {schedule === 'windows' ? (
        <FormField
          control={control}
          name="windows"
          label="Windows"
          unit="s"
          placeholder="600–660, 900–960"
          hint="Start and end on the axis of the recordings."
          required
        />
      ) : null}
    </>
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', flexWrap: 'wrap', gap: space.m },
  part: { flexGrow: 1, flexBasis: 140, minWidth: 0 },
});
