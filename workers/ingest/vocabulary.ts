/**
 * The vocabulary of headers: which plain names (case, separators and unit taken off, see header-words.ts) mean which
 * channel. The first name that a file has wins, so the most definite ones stand first.
 */
import type { UnitQuantity } from './header-words';

export interface ChannelWords {
  quantity: UnitQuantity | null;
  names: readonly string[];
}

const axis3 = <P extends string>(
  prefix: P,
  quantity: UnitQuantity,
  stems: readonly string[],
): Record<`${P}_${'x' | 'y' | 'z'}`, ChannelWords> => {
  const words = (axis: string): ChannelWords => ({
    quantity,
    names: stems.flatMap((stem) => [`${stem}${axis}`, `${axis}${stem}`, `${stem}${axis}axis`]),
  });
  return { [`${prefix}_x`]: words('x'), [`${prefix}_y`]: words('y'), [`${prefix}_z`]: words('z') } as Record<
    `${P}_${'x' | 'y' | 'z'}`,
    ChannelWords
  >;
};

const withNames = ({ quantity, names }: ChannelWords, more: readonly string[]): ChannelWords => ({
  quantity,
  names: [...names, ...more],
});

/** One column of time. */
export const TIME_WORDS: ChannelWords = {
  quantity: 'time',
  names: [
    'time', 't', 'timestamp', 'timeofday', 'localtime', 'gpstime',  'timestamps', 'times', 'ts', 'stamp', 'timetag', 'sampletime', 'systemtime', 'hosttime',
    'elapsed', 'elapsedtime', 'timeelapsed', 'secondselapsed', 'unixtime', 'unix', 'epoch', 'epochtime', 'posixtime', 'clock',
    'utctime', 'timeutc', 'utc', 'datetime', 'dateandtime', 'isotime', 'date', 'timeboot', 'uptime', 'timesinceboot', 'timestartup', 'timesincestart', 'timesincestartup', 'stamptime', 'micros', 'millis',
  ],
}; // prettier-ignore
/** A day without a time. */
export const DATE_WORDS: ChannelWords = {
  quantity: null,
  names: ['date', 'utcdate', 'dateutc', 'gpsdate', 'day', 'localdate', 'ddmmyy', 'yyyymmdd'],
};
/** Whole seconds and nanoseconds in two columns. */
export const SECONDS_WORDS: ChannelWords = {
  quantity: null,
  names: ['timestampsec', 'stampsec', 'stampsecs', 'headerstampsec', 'headerstampsecs', 'timesec', 'tsec', 'sec', 'secs', 'seconds'],
}; // prettier-ignore
export const NANOSECONDS_WORDS: ChannelWords = {
  quantity: null,
  names: ['timestampnanosec', 'timestampnsec', 'stampnanosec', 'stampnsec', 'stampnsecs', 'headerstampnanosec', 'headerstampnsecs', 'timensec', 'tnsec', 'nanosec', 'nanosecs', 'nanoseconds', 'nsec', 'nsecs'],
}; // prettier-ignore
/** GPS week and seconds of week. */
export const WEEK_WORDS: ChannelWords = {
  quantity: null,
  names: ['gpsweek', 'week', 'weeknumber', 'gpsweeknumber', 'wn', 'wnc'],
};
export const TIME_OF_WEEK_WORDS: ChannelWords = {
  quantity: 'time',
  names: ['tow', 'gpstow', 'timeofweek', 'gpstimeofweek', 'secondsofweek', 'gpssecondsofweek', 'gpsseconds', 'sow', 'itow'],
}; // prettier-ignore

/** Body rates by their letters and by what turns. */
const BODY_RATES = {
  gyro_x: ['p', 'rollrate'],
  gyro_y: ['q', 'pitchrate'],
  gyro_z: ['r', 'yawrate'],
} as const;

const NAMED_AXES = {
  ...axis3('gyro', 'rate', ['gyro', 'gyr', 'gyroscope', 'gyrorate', 'angularvelocity', 'angvel', 'angularrate', 'rotationrate', 'turnrate', 'rate', 'omega', 'w', 'g']),
  ...axis3('accel', 'accel', ['accel', 'acc', 'acceleration', 'accelerometer', 'linearacceleration', 'linacc', 'specificforce', 'force', 'f', 'a']),
  ...axis3('dtheta', 'rate', ['deltatheta', 'dtheta', 'deltaangle', 'dangle', 'dang', 'deltaang']),
  ...axis3('dv', 'accel', ['deltav', 'dv', 'deltavelocity', 'dvel', 'deltavel']),
}; // prettier-ignore
export const IMU_WORDS = {
  ...NAMED_AXES,
  gyro_x: withNames(NAMED_AXES.gyro_x, BODY_RATES.gyro_x),
  gyro_y: withNames(NAMED_AXES.gyro_y, BODY_RATES.gyro_y),
  gyro_z: withNames(NAMED_AXES.gyro_z, BODY_RATES.gyro_z),
};
export type ImuChannel = keyof typeof IMU_WORDS;

const along = (
  quantity: UnitQuantity,
  letters: readonly string[],
  stems: readonly string[],
): ChannelWords => ({
  quantity,
  names: stems.flatMap((stem) => letters.flatMap((letter) => [`${stem}${letter}`, `${letter}${stem}`])),
});
const NORTH = ['n', 'north'];
const EAST = ['e', 'east'];
const DOWN = ['d', 'down'];
const UP = ['u', 'up'];
const VELOCITY_STEMS = ['v', 'vel', 'velocity', 'speed'];
const SIGMA_STEMS = [
  'sigma',
  'sd',
  'std',
  'stddev',
  'stdev',
  'sigmapos',
  'sigmaposition',
  'posstd',
  'possd',
  'possigma',
];
const VELOCITY_SIGMA_STEMS = [
  'sigmav',
  'sigmavel',
  'sigmavelocity',
  'sdv',
  'sdvel',
  'stdv',
  'stdvel',
  'velstd',
  'velsd',
  'velsigma',
];

export const GNSS_WORDS = {
  lat: { quantity: 'angle', names: ['lat', 'latitude', 'phi', 'geodeticlatitude', 'positionlat', 'poslat'] },
  lon: { quantity: 'angle', names: ['lon', 'long', 'lng', 'longitude', 'geodeticlongitude', 'positionlon', 'poslon'] },
  heightEllipsoid: {
    quantity: 'length',
    names: ['heightellipsoid', 'ellipsoidheight', 'ellipsoidalheight', 'heightaboveellipsoid', 'hae', 'altellipsoid', 'altitudeellipsoid', 'heighthae', 'althae', 'height', 'h', 'hgt', 'hell', 'ellheight', 'heightell'],
  },
  heightSea: {
    quantity: 'length',
    names: ['hmsl', 'heightmsl', 'mslheight', 'altmsl', 'altitudemsl', 'msl', 'mslaltitude', 'altitudeabovesealevel', 'heightabovesealevel', 'elevation', 'ele', 'orthometricheight'],
  },
  latHemisphere: { quantity: null, names: ['ns', 'nsindicator', 'nshemisphere', 'lathemisphere', 'latitudehemisphere', 'latdir', 'latns', 'latitudens', 'northsouth', 'nors'] },
  lonHemisphere: { quantity: null, names: ['ew', 'ewindicator', 'ewhemisphere', 'lonhemisphere', 'longitudehemisphere', 'londir', 'lonew', 'longitudeew', 'eastwest', 'eorw'] },
  ecefX: { quantity: 'length', names: ['ecefx', 'xecef', 'positionecefx', 'ecefpositionx', 'posecefx', 'ecefposx'] },
  ecefY: { quantity: 'length', names: ['ecefy', 'yecef', 'positionecefy', 'ecefpositiony', 'posecefy', 'ecefposy'] },
  ecefZ: { quantity: 'length', names: ['ecefz', 'zecef', 'positionecefz', 'ecefpositionz', 'posecefz', 'ecefposz'] },
  ecefVx: { quantity: 'speed', names: ['ecefvx', 'vxecef', 'velocityecefx', 'ecefvelocityx', 'ecefvelx', 'velecefx'] },
  ecefVy: { quantity: 'speed', names: ['ecefvy', 'vyecef', 'velocityecefy', 'ecefvelocityy', 'ecefvely', 'velecefy'] },
  ecefVz: { quantity: 'speed', names: ['ecefvz', 'vzecef', 'velocityecefz', 'ecefvelocityz', 'ecefvelz', 'velecefz'] },
  /** Says not whose axes. */
  vx: along('speed', ['x'], ['v', 'vel', 'velocity', 'speed']),
  vy: along('speed', ['y'], ['v', 'vel', 'velocity', 'speed']),
  vz: along('speed', ['z'], ['v', 'vel', 'velocity', 'speed']),
  climb: { quantity: 'speed', names: ['climb', 'climbrate', 'verticalspeed', 'vspeed', 'speedup', 'verticalvelocity'] },
  /** Says not above what. */
  heightPlain: { quantity: 'length', names: ['altitude', 'alt'] },
  vn: along('speed', NORTH, VELOCITY_STEMS),
  ve: along('speed', EAST, VELOCITY_STEMS),
  vd: along('speed', DOWN, VELOCITY_STEMS),
  vu: along('speed', UP, VELOCITY_STEMS),
  speed: {
    quantity: 'speed',
    names: ['groundspeed', 'speedoverground', 'sog', 'gspeed', 'hspeed', 'speedground', 'horizontalspeed', 'speed', 'velocity', 'spd', 'gspd', 'groundspd'],
  },
  course: {
    quantity: 'angle',
    names: ['course', 'courseoverground', 'cog', 'trackangle', 'track', 'courseangle', 'headmot', 'headingofmotion', 'motionheading', 'bearing', 'gcrs', 'crs', 'gcourse', 'gpsheading', 'gnssheading'],
  },
  sigmaN: along('length', NORTH, SIGMA_STEMS),
  sigmaE: along('length', EAST, SIGMA_STEMS),
  sigmaD: along('length', [...DOWN, ...UP, 'height'], SIGMA_STEMS),
  sigmaHorizontal: {
    quantity: 'length',
    names: ['hacc', 'horizontalaccuracy', 'accuracyhorizontal', 'horizontalaccuracyestimate', 'sigmahorizontal', 'sigmahor', 'hsigma', 'hstd', 'eph', 'posacc', 'positionaccuracy', 'accuracy'],
  },
  sigmaVertical: {
    quantity: 'length',
    names: ['vacc', 'verticalaccuracy', 'accuracyvertical', 'sigmavertical', 'sigmaver', 'vsigma', 'vstd', 'epv', 'heightaccuracy'],
  },
  sigmaVn: along('speed', NORTH, VELOCITY_SIGMA_STEMS),
  sigmaVe: along('speed', EAST, VELOCITY_SIGMA_STEMS),
  sigmaVd: along('speed', [...DOWN, ...UP], VELOCITY_SIGMA_STEMS),
  sigmaSpeed: { quantity: 'speed', names: ['sacc', 'speedaccuracy', 'velocityaccuracy', 'velacc', 'sigmaspeed', 'sigmavelocity', 'eps'] },
  quality: { quantity: null, names: ['quality', 'fixquality', 'fix', 'fixtype', 'fixmode', 'fixstatus', 'gpsfix', 'gnssfix', 'qualityindicator', 'q'] },
} as const satisfies Record<string, ChannelWords>; // prettier-ignore
export type GnssChannel = keyof typeof GNSS_WORDS;

export const ATTITUDE_WORDS = {
  roll: { quantity: 'angle', names: ['roll', 'rollangle', 'phi', 'eulerroll', 'eulerx'] },
  pitch: { quantity: 'angle', names: ['pitch', 'pitchangle', 'theta', 'eulerpitch', 'eulery'] },
  yaw: { quantity: 'angle', names: ['yaw', 'yawangle', 'heading', 'psi', 'azimuth', 'euleryaw', 'eulerz', 'trueheading'] },
} as const satisfies Record<string, ChannelWords>; // prettier-ignore

/** Sensors besides IMU and GNSS; plain names count only in a file of their own. */
export const AID_WORDS = {
  barometricHeight: { quantity: 'length', names: ['barometricheight', 'barometricaltitude', 'baroheight', 'baroaltitude', 'baroalt', 'heightbaro', 'altbaro', 'altitudebaro', 'pressureheight', 'pressurealtitude', 'pressurealt'] },
  plainHeight: { quantity: 'length', names: ['height', 'altitude', 'alt', 'h', 'baro', 'barometer'] },
  pressure: { quantity: 'pressure', names: ['pressure', 'airpressure', 'baropressure', 'barometerpressure', 'barometricpressure', 'staticpressure', 'atmosphericpressure', 'baro', 'barometer', 'press'] },
  heading: { quantity: 'angle', names: ['trueheading', 'headingtrue', 'heading', 'hdg', 'hdt', 'compassheading', 'compass', 'magneticheading', 'magheading', 'headingmagnetic', 'headingmag'] },
  wheelSpeed: { quantity: 'speed', names: ['wheelspeed', 'odometerspeed', 'odospeed', 'speedodometer', 'speedwheel', 'vehiclespeed', 'canspeed', 'wheelvelocity', 'odometervelocity', 'odovel', 'axlespeed'] },
  plainSpeed: { quantity: 'speed', names: ['speed', 'velocity', 'v', 'forwardspeed'] },
  distance: { quantity: 'length', names: ['odometer', 'odometerdistance', 'odo', 'mileage', 'distancedriven', 'wheeldistance'] },
} as const satisfies Record<string, ChannelWords>; // prettier-ignore
