import { useWatch } from 'react-hook-form';
import { View } from 'react-native';
import { ANGLE_UNITS, PositionPart, SigmaPart, VelocityPart } from './TrackParts';
import { Column, fields, Group, Pick, type PartProps } from './parts';
import { TimePart } from './TimePart';

const REPEATS = [
  { value: '', label: 'none, each row is a fix' },
  { value: 'keep', label: 'are kept, each row is a fix' },
  { value: 'drop', label: 'are left out: a fix stands until the next one' },
] as const;

/** Everything that a GNSS file may say. */
export function GnssPart(props: PartProps) {
  return (
    <>
      <TimePart {...props} name="gnss.time" />
      <PositionPart {...props} role="gnss" />
      <VelocityPart {...props} role="gnss" />
      <SigmaPart {...props} of="positionSigma" />
      <SigmaPart {...props} of="velocitySigma" />
      <Group title="Fix">
        <View style={fields.row}>
          <Column {...props} name="gnss.quality" label="Fix quality" optional />
          <Pick
            control={props.control}
            name="gnss.repeats"
            label="Rows that repeat a fix"
            options={REPEATS}
            roomy
          />
        </View>
      </Group>
    </>
  );
}

/** A better trajectory of the same drive. */
export function ReferencePart(props: PartProps) {
  const given = useWatch({ control: props.control, name: 'reference.attitude.given' });
  return (
    <>
      <TimePart {...props} name="reference.time" />
      <PositionPart {...props} role="reference" />
      <VelocityPart {...props} role="reference" />
      <Group title="Attitude">
        <View style={fields.row}>
          <Pick
            control={props.control}
            name="reference.attitude.given"
            label="Attitude"
            options={[
              { value: 'no', label: 'not given' },
              { value: 'yes', label: 'roll, pitch, yaw' },
            ]}
          />
          {given === 'yes' ? (
            <Pick
              control={props.control}
              name="reference.attitude.unit"
              label="Attitude in"
              options={ANGLE_UNITS}
            />
          ) : null}
        </View>
        {given === 'yes' ? (
          <View style={fields.row}>
            {(['Roll', 'Pitch', 'Yaw'] as const).map((axis, i) => (
              <Column
                key={axis}
                {...props}
                name={`reference.attitude.columns.${i}` as 'reference.attitude.columns.0'}
                label={axis}
              />
            ))}
          </View>
        ) : null}
      </Group>
    </>
  );
}
