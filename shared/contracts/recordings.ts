/** Recordings: upload, channel map, decoding, what the intake found, decimated series. */
import { z } from 'zod';
import { idSchema, isoTimeSchema, listSortSchema, nameSchema, pageQuerySchema } from './common';
import { axisMapSchema } from './vehicles';

export const recordingStatusSchema = z.enum(['uploaded', 'decoding', 'ready', 'needs-mapping', 'rejected']);
export type RecordingStatus = z.infer<typeof recordingStatusSchema>;

const column = z.string().min(1).max(200).describe('Header of the column, as the file writes it.');
const columns3 = z.tuple([column, column, column]);

/**
 * `imu2`: what the first IMU file lacks, where gyro and accelerometer have a file each; `aids`: barometer, heading, odometer.
 * Fixes may be in the IMU's file, other sensors in any.
 */
export const fileRoleSchema = z.enum(['imu', 'gnss', 'reference', 'imu2', 'aids']);
export type FileRole = z.infer<typeof fileRoleSchema>;

/**
 * How a file tells time. With two columns the first is whole seconds, the GPS week or the date; the second the fraction, the
 * seconds of the week or the time of day.
 */
export const timeMapSchema = z.object({
  columns: z.array(column).min(1).max(2),
  base: z.enum([
    's',
    'ms',
    'us',
    'ns',
    's+ns',
    'gps-week+s',
    'iso8601',
    'gps-s',
    'date+time',
    'time-of-day',
    'counter',
  ]),
  offsetS: z
    .number()
    .default(0)
    .describe('Seconds added after conversion, to bring this file onto the time axis of the IMU file.'),
  stamp: z
    .enum(['end', 'middle', 'start'])
    .default('end')
    .describe('Where in its interval a sample is stamped.'),
  scale: z
    .enum(['utc', 'gps'])
    .optional()
    .describe(
      'What an absolute time counts on; GPS time is ahead of UTC by the leap seconds. Left out: UTC.',
    ),
  zoneMin: z
    .number()
    .min(-1440)
    .max(1440)
    .optional()
    .describe('Minutes by which a text time without a zone is ahead of UTC. Left out: 0.'),
  dateOrder: z
    .enum(['ymd', 'dmy', 'mdy'])
    .optional()
    .describe('Order of the parts of a written date. Left out: year, month, day.'),
  date: z.iso.date().optional().describe('The day that a time of day starts on.'),
  rateHz: z.number().positive().optional().describe('Counts a second of a counter, Hz.'),
  wrap: z
    .number()
    .positive()
    .optional()
    .describe(
      'Count at which a clock or counter starts again from 0, in its own unit; 4294967296 for 32 bits.',
    ),
});
export type TimeMap = z.infer<typeof timeMapSchema>;

export const gyroUnitSchema = z.enum(['rad/s', 'deg/s', 'deg/h', 'rad', 'deg']);
export const accelUnitSchema = z.enum(['m/s^2', 'g', 'mg', 'm/s', 'g*s']);
export type GyroUnit = z.infer<typeof gyroUnitSchema>;
export type AccelUnit = z.infer<typeof accelUnitSchema>;

const turn = z.union([z.literal(1), z.literal(-1)]);
/** What both sensors of an IMU may say of their three columns. */
const sensorFields = {
  columns: columns3,
  file: z
    .enum(['imu', 'imu2'])
    .optional()
    .describe('The file that holds the columns. Left out: the first of the IMU files that has them.'),
  signs: z
    .tuple([turn, turn, turn])
    .optional()
    .describe('−1 turns a column round before the axes apply. Left out: none.'),
  scale: z
    .number()
    .refine((value) => value !== 0, { message: 'The scale must not be 0.' })
    .optional()
    .describe('Units a count, for raw counts of a sensor. Left out: 1.'),
};

export const imuMapSchema = z.object({
  time: timeMapSchema,
  gyro: z.object({ ...sensorFields, unit: gyroUnitSchema }),
  accel: z.object({
    ...sensorFields,
    unit: accelUnitSchema,
    sign: z
      .enum(['specific-force', 'opposite'])
      .default('specific-force')
      .describe('specific-force: an accelerometer lying still, z down, reads −g.'),
  }),
  accelTime: timeMapSchema
    .optional()
    .describe(
      'Time of the accelerometer where it has rows or a file of its own: it is then brought onto the gyro’s stamps.',
    ),
  sampling: z
    .enum(['mean-rate', 'instantaneous', 'increment'])
    .default('mean-rate')
    .describe('Mean rates over the interval that ends at the stamp, instantaneous rates, or increments.'),
  axes: axisMapSchema.optional().describe("Sensor axes as mounted; left out: the vehicle's."),
  mounting: z
    .object({ rollDeg: z.number(), pitchDeg: z.number(), yawDeg: z.number() })
    .optional()
    .describe(
      'Measured attitude of the sensor, after the axes apply, in the vehicle: yaw, then pitch, then roll, degrees.',
    ),
});
export type ImuMap = z.infer<typeof imuMapSchema>;

export const angleUnitSchema = z.enum(['deg', 'rad']);
export const speedUnitSchema = z.enum(['m/s', 'mm/s', 'km/h', 'kn']);
/** `ecef`: the columns of latitude, longitude and height hold X, Y and Z, m. */
export const positionUnitSchema = z.enum(['deg', 'rad', 'ddmm.mmmm', '1e-7deg', 'ecef']);

export const positionMapSchema = z.object({
  lat: column,
  lon: column,
  height: column.optional(),
  unit: positionUnitSchema.default('deg'),
  heightUnit: z.enum(['m', 'mm', 'ft']).default('m'),
  heightDatum: z.enum(['ellipsoid', 'sea-level']).default('ellipsoid'),
  latHemisphere: column.optional().describe('Column that says N or S, where the latitude has no sign.'),
  lonHemisphere: column.optional().describe('Column that says E or W, where the longitude has no sign.'),
});
export const velocityMapSchema = z.discriminatedUnion('frame', [
  z.object({
    frame: z.enum(['ned', 'enu', 'neu', 'ecef']),
    columns: columns3,
    unit: speedUnitSchema.default('m/s'),
  }),
  z.object({
    frame: z.literal('speed-course'),
    speed: column,
    course: column,
    unit: speedUnitSchema.default('m/s'),
    courseUnit: angleUnitSchema.default('deg'),
    climb: column.optional().describe('Vertical speed, upwards, in the unit of the speed.'),
  }),
]);
/** σ columns: one horizontal and one vertical, or one an axis (north, east, down). */
export const sigmaMapSchema = z.object({
  columns: z.union([z.tuple([column, column]), columns3]),
  unit: z.enum(['m', 'mm', 'm/s', 'mm/s']),
});

export const gnssMapSchema = z.object({
  time: timeMapSchema,
  position: positionMapSchema,
  velocity: velocityMapSchema.optional(),
  positionSigma: sigmaMapSchema.optional(),
  velocitySigma: sigmaMapSchema.optional(),
  quality: column.optional(),
  repeats: z
    .enum(['keep', 'drop'])
    .optional()
    .describe('drop: the file holds each fix until the next; rows that bring nothing new are left out.'),
});
export type GnssMap = z.infer<typeof gnssMapSchema>;

export const referenceMapSchema = z.object({
  time: timeMapSchema,
  position: positionMapSchema,
  velocity: velocityMapSchema.optional(),
  attitude: z.object({ columns: columns3.describe('roll, pitch, yaw'), unit: angleUnitSchema }).optional(),
});
export type ReferenceMap = z.infer<typeof referenceMapSchema>;

const aidFields = {
  column,
  file: fileRoleSchema.optional().describe('Left out: the file of the other sensors, else the IMU’s.'),
  time: timeMapSchema.optional().describe('Left out: as the file tells it for its main sensor.'),
  sigma: column.optional().describe('1σ, in the same unit.'),
};
export const barometerUnitSchema = z.enum(['m', 'mm', 'ft', 'Pa', 'hPa', 'kPa']);
/** `m`: distance so far; `count`: pulses so far, of `scale` metres each. */
export const odometerUnitSchema = z.enum(['m/s', 'mm/s', 'km/h', 'kn', 'm', 'count']);

/** Sensors besides IMU and GNSS, in any of the files. */
export const aidsMapSchema = z.object({
  barometer: z.object({ ...aidFields, unit: barometerUnitSchema }).optional(),
  heading: z
    .object({
      ...aidFields,
      unit: angleUnitSchema,
      offsetDeg: z.number().optional().describe('Added: the declination where it is magnetic, degrees.'),
    })
    .optional(),
  odometer: z
    .object({ ...aidFields, unit: odometerUnitSchema, scale: z.number().positive().optional() })
    .optional(),
});
export type AidsMap = z.infer<typeof aidsMapSchema>;

export const channelMapSchema = z.object({
  imu: imuMapSchema.optional(),
  gnss: gnssMapSchema.optional(),
  reference: referenceMapSchema.optional(),
  aids: aidsMapSchema.optional(),
});
/** A file whose part is left out is mapped from its headers. */
export type ChannelMap = z.infer<typeof channelMapSchema>;

/** The JSON part `meta` of POST /recordings. */
export const recordingMetaSchema = z.object({
  name: nameSchema,
  vehicleId: idSchema.optional(),
  channelMap: channelMapSchema.optional(),
});
export type RecordingMeta = z.infer<typeof recordingMetaSchema>;

export const recordingPatchSchema = z.object({
  name: nameSchema.optional(),
  vehicleId: idSchema.nullable().optional(),
  notes: z.string().max(2000).optional(),
});
export type RecordingPatch = z.infer<typeof recordingPatchSchema>;

/** A remedy that can be accepted as it stands. */
export const mapFixSchema = z.object({
  label: z.string().describe('What a button says.'),
  map: channelMapSchema.describe('Parts that take the place of those in force.'),
});
export type MapFix = z.infer<typeof mapFixSchema>;

/** Why a file could not be used: what, where, and what to do. `line` counts from 1 and includes the header. */
export const intakeProblemSchema = z.object({
  code: z.string(),
  file: fileRoleSchema.nullable(),
  line: z.number().int().nullable(),
  column: z.string().nullable(),
  message: z.string(),
  remedy: z.string(),
  fix: mapFixSchema.optional(),
});
export type IntakeProblem = z.infer<typeof intakeProblemSchema>;

/** What columns were taken for, and why. */
export const channelGuessSchema = z.object({
  channel: z.string().describe('time, gyro, accelerometer, position, height, velocity, position σ …'),
  columns: z.array(z.string()),
  takenAs: z.string().describe('Unit, frame or time base, as the channel map names it.'),
  confidence: z.number().min(0).max(1),
  reason: z.string().describe('A whole sentence.'),
});
export type ChannelGuess = z.infer<typeof channelGuessSchema>;

/** What the mapping screen shows of a file: headers, first rows, and what was guessed. */
export const filePreviewSchema = z.object({
  role: fileRoleSchema,
  headers: z.array(z.string()),
  rows: z.array(z.array(z.string())).describe('The first rows, as text.'),
  missing: z.array(z.string()).describe('Channels that no column was found for, in plain words.'),
  guesses: z.array(channelGuessSchema).optional().describe('Left out where the map was given.'),
});
export type FilePreview = z.infer<typeof filePreviewSchema>;

export const severitySchema = z.enum(['info', 'warn', 'stop']);
export type Severity = z.infer<typeof severitySchema>;

/** One thing the intake found. Times are on the recording's axis, seconds. */
export const healthFindingSchema = z.object({
  code: z.string(),
  severity: severitySchema,
  sentence: z.string(),
  figure: z.object({ value: z.number(), unit: z.string() }).nullable(),
  intervalsS: z.array(z.tuple([z.number(), z.number()])),
  remedy: z.string().nullable(),
  fix: mapFixSchema.optional(),
});
export type HealthFinding = z.infer<typeof healthFindingSchema>;

export const healthReportSchema = z.object({
  verdict: z.enum(['usable', 'with-care', 'not-usable']),
  sentence: z.string(),
  imu: z.object({ samples: z.number().int(), rateHz: z.number(), gaps: z.number().int() }),
  gnss: z.object({
    epochs: z.number().int(),
    rateHz: z.number(),
    hasVelocity: z.boolean(),
    hasPositionSigma: z.boolean(),
    hasVelocitySigma: z.boolean(),
  }),
  overlapS: z.tuple([z.number(), z.number()]).describe('Where IMU and GNSS both have data, s.'),
  findings: z.array(healthFindingSchema),
});
export type HealthReport = z.infer<typeof healthReportSchema>;

/** The thin drawing of a whole recording. Every array has one entry a bucket of equal time. */
export const stripSchema = z.object({
  startS: z.number(),
  endS: z.number(),
  speedMPerS: z.array(z.number().nullable()).describe('Largest horizontal speed in the bucket, m/s.'),
  gnssFixes: z.array(z.number().int()).describe('GNSS fixes in the bucket.'),
  gapsS: z.array(z.tuple([z.number(), z.number()])).describe('IMU stretches without samples, s.'),
  clippedS: z.array(z.tuple([z.number(), z.number()])).describe('Stretches at the sensor range, s.'),
});
export type Strip = z.infer<typeof stripSchema>;

/** Which instant of the source's clock is 0 on the recording's axis. */
export const timeOriginSchema = z.object({
  sourceS: z
    .number()
    .describe("The IMU file's own clock at 0 on the axis, s. A log in plain seconds keeps its zero."),
  utc: isoTimeSchema.nullable(),
  gpsWeek: z.number().int().nullable(),
  gpsTowS: z.number().nullable(),
});
export type TimeOrigin = z.infer<typeof timeOriginSchema>;

/** A remedy of the health report that somebody accepted. */
export const remedySchema = z.object({
  code: z.string().describe('Of the finding.'),
  label: z.string(),
  at: isoTimeSchema,
  by: z.string(),
});
export type Remedy = z.infer<typeof remedySchema>;
/** POST /recordings/:id/remedies. */
export const remedyRequestSchema = z.object({ code: z.string().min(1).max(100) });

export const recordingFileSchema = z.object({
  role: fileRoleSchema,
  name: z.string(),
  bytes: z.number(),
  sha256: z.string(),
});
export type RecordingFile = z.infer<typeof recordingFileSchema>;

export const recordingSchema = z.object({
  id: idSchema,
  name: z.string(),
  notes: z.string(),
  status: recordingStatusSchema,
  progress: z.number().min(0).max(1).describe('Of decoding.'),
  problems: z.array(intakeProblemSchema),
  vehicleId: idSchema.nullable(),
  vehicleName: z.string().nullable(),
  createdAt: isoTimeSchema,
  createdBy: z.string(),
  startS: z.number().nullable(),
  endS: z.number().nullable(),
  durationS: z.number().nullable(),
  hasReference: z.boolean(),
  timeOrigin: timeOriginSchema.nullable(),
  health: healthReportSchema.nullable(),
  strip: stripSchema.nullable(),
  files: z.array(recordingFileSchema),
  channelMap: channelMapSchema.nullable().describe('The map in force: given, or guessed from the headers.'),
  remedies: z.array(remedySchema).describe('Accepted, in order; mapping by hand begins anew.'),
  previews: z.array(filePreviewSchema).describe('Empty in lists.'),
});
export type Recording = z.infer<typeof recordingSchema>;

/** GET /recordings. `search` looks in the name and in the vehicle's. */
export const recordingListQuerySchema = pageQuerySchema.extend({
  sort: listSortSchema.default('-createdAt'),
  since: isoTimeSchema.optional().describe('Only those that arrived then or later.'),
  status: z
    .string()
    .transform((text) => text.split(','))
    .pipe(z.array(recordingStatusSchema))
    .optional()
    .describe('One or several with commas between them.'),
  vehicleId: idSchema.optional(),
});
export type RecordingListQuery = z.infer<typeof recordingListQuerySchema>;

/** GET /recordings/:id/baseline-track: the GNSS-only solution, thinned. */
export const baselineTrackQuerySchema = z.object({
  points: z.coerce.number().int().min(10).max(10_000).default(1500),
});
export const baselineTrackSchema = z.object({
  timeS: z.array(z.number()),
  latDeg: z.array(z.number()),
  lonDeg: z.array(z.number()),
});
export type BaselineTrack = z.infer<typeof baselineTrackSchema>;

/** Every channel of a decoded recording that plots may ask for, with its unit. */
export const SERIES_CHANNELS = {
  gyro_x: '°/s',
  gyro_y: '°/s',
  gyro_z: '°/s',
  accel_x: 'm/s²',
  accel_y: 'm/s²',
  accel_z: 'm/s²',
  gnss_north: 'm',
  gnss_east: 'm',
  gnss_height: 'm',
  gnss_vn: 'm/s',
  gnss_ve: 'm/s',
  gnss_vd: 'm/s',
} as const;
export type SeriesChannel = keyof typeof SERIES_CHANNELS;

export const seriesQuerySchema = z.object({
  channels: z
    .string()
    .transform((text) => text.split(','))
    .pipe(z.array(z.enum(Object.keys(SERIES_CHANNELS) as [SeriesChannel, ...SeriesChannel[]])).min(1)),
  from: z.coerce.number().optional(),
  to: z.coerce.number().optional(),
  points: z.coerce.number().int().min(10).max(10_000).default(1500),
});
export type SeriesQuery = z.infer<typeof seriesQuerySchema>;

/** Min–max decimated: a one-sample spike is kept. NaN is sent as null. */
export const seriesSchema = z.object({
  channels: z.array(
    z.object({
      name: z.string(),
      unit: z.string(),
      timeS: z.array(z.number()),
      values: z.array(z.number().nullable()),
    }),
  ),
});
export type Series = z.infer<typeof seriesSchema>;

/** POST /recordings/:id/map-preview with a channel map: what it makes of the first rows. */
export const mapPreviewSchema = z.object({
  outcome: z.enum(['ready', 'needs-mapping', 'rejected']),
  problems: z.array(intakeProblemSchema),
  health: healthReportSchema.nullable().describe('Of the first rows alone.'),
  series: seriesSchema.nullable().describe('Gyro and accelerometer of the first rows, thinned.'),
});
export type MapPreview = z.infer<typeof mapPreviewSchema>;
