import type { UseFormReturn } from 'react-hook-form';
import { View } from 'react-native';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';
import type { FileRole } from '@/shared/contracts/recordings';
import { FilePick } from './FilePick';
import { Fold } from '@/components/ui/Fold';
import type { UploadForm } from './UploadScreen';

export interface UploadFilesProps {
  form: UseFormReturn<UploadForm>;
  disabled: boolean;
  /** An IMU log was chosen. */
  onFirst: (chosen: File) => void;
}

/** The logs of one drive: one or two are usual, the rest a press away. */
export function UploadFiles({ form, disabled, onFirst }: UploadFilesProps) {
  const { errors } = form.formState;
  const chosen = form.watch(['imu2', 'reference', 'aids']);
  const pick = ({ role, label, hint, optional }: LogKind) => (
    <FilePick
      key={role}
      label={label}
      hint={hint}
      file={form.watch(role)}
      onPick={(picked) => {
        form.setValue(role, picked, { shouldValidate: form.formState.isSubmitted });
        if (role === 'imu' && picked) onFirst(picked);
      }}
      error={errors[role]?.message}
      optional={optional}
      disabled={disabled}
    />
  );
  return (
    <View style={{ gap: space.m }}>
      {MAIN.map(pick)}
      <Fold
        title="A second IMU log, a reference trajectory, other sensors"
        open={chosen.some(Boolean)}
        fault={MORE.some(({ role }) => errors[role])}
      >
        {MORE.map(pick)}
      </Fold>
      <Fold title="What is understood">
        {UNDERSTOOD.map((line) => (
          <Text key={line} variant="label" tone="soft">
            {line}
          </Text>
        ))}
      </Fold>
    </View>
  );
}

interface LogKind {
  role: FileRole;
  label: string;
  hint: string;
  optional?: boolean;
}

const MAIN: readonly LogKind[] = [
  {
    role: 'imu',
    label: 'IMU log',
    hint: 'Time, three gyro and three accelerometer columns, as CSV; it may hold the GNSS fixes too.',
  },
  {
    role: 'gnss',
    label: 'GNSS log',
    hint: 'CSV, NMEA 0183 or GPX. Leave it out where the IMU log holds the fixes.',
    optional: true,
  },
];
const MORE: readonly LogKind[] = [
  {
    role: 'imu2',
    label: 'Second IMU log',
    hint: 'Where gyro and accelerometer have a file each.',
    optional: true,
  },
  {
    role: 'reference',
    label: 'Reference trajectory',
    hint: 'A better trajectory of the same drive, against which drift is then measured.',
    optional: true,
  },
  {
    role: 'aids',
    label: 'Log of other sensors',
    hint: 'Barometer, heading, odometer, where they are in none of the files above.',
    optional: true,
  },
];

const UNDERSTOOD: readonly string[] = [
  'Files: text tables with commas, semicolons or tabs, with or without headers, units row or comment lines, decimal point or comma; NMEA 0183; GPX 1.1; each also as gzip.',
  'Times: s, ms, µs, ns, seconds with nanoseconds, GPS week and seconds, UNIX time, dates and times as text, counters at a stated rate.',
  'Turn rates in rad/s, °/s, °/h or as angles a sample; accelerations in m/s², g, mg or as velocities a sample; raw counts with their scale.',
  'Positions in degrees, radians, ddmm.mmmm, 10⁻⁷ degrees or Earth-fixed X, Y, Z; height above the ellipsoid or the sea; velocity along axes or as speed and course.',
  'Columns whose headers name channel and unit, like time_s, gyro_x_deg_s or lat_deg, need no word; for any others you say on the next page what they mean.',
];
