import Svg, { Circle, Path } from 'react-native-svg';
import { useTheme } from './ThemeProvider';
import { toneColour, type Tone } from './Text';

export type IconName = keyof typeof paths;

export interface IconProps {
  name: IconName;
  size?: number;
  tone?: Tone;
  colour?: string;
}

/** Our own line icons on a 24 grid. Always beside a word, so hidden from the screen reader. */
export function Icon({ name, size = 24, tone = 'ink', colour }: IconProps) {
  const { palette } = useTheme();
  const stroke = colour ?? toneColour(palette, tone);
  return (
    <Svg width={size} height={size} viewBox="0 0 24 24" fill="none" aria-hidden>
      <Path d={paths[name]} stroke={stroke} strokeWidth={1.75} strokeLinecap="round" strokeLinejoin="round" />
      {name === 'more'
        ? [5, 12, 19].map((x) => <Circle key={x} cx={x} cy={12} r={1.6} fill={stroke} />)
        : null}
    </Svg>
  );
}

const paths = {
  today: 'M4 6h16 M4 12h16 M4 18h9',
  recordings: 'M2.5 16c2.5 0 2.5-10 5-10s2.5 13 5.5 13 3-10 5.5-10c1.6 0 2 1.6 3 3.4',
  bench: 'M3 8h18 M3 16h18 M8 4.5v7 M15.5 12.5v7',
  sets: 'M4 4.5h16v6H4z M4 13.5h16v6H4z',
  trials: 'M3 19h18 M4 19c8-.5 12.5-5 15-14',
  more: '',
  back: 'M14.5 5.5 8 12l6.5 6.5',
  forward: 'M9.5 5.5 16 12l-6.5 6.5',
  down: 'M5.5 9.5 12 16l6.5-6.5',
  up: 'M5.5 14.5 12 8l6.5 6.5',
  plus: 'M12 5v14 M5 12h14',
  minus: 'M5 12h14',
  close: 'M6 6l12 12 M18 6 6 18',
  check: 'M5 12.5 10 17.5 19 7',
  search: 'M10.5 4a6.5 6.5 0 1 1 0 13 6.5 6.5 0 0 1 0-13z M15.5 15.5 20 20',
  upload: 'M12 16V4.5 M7 9l5-5 5 5 M4.5 15.5v4h15v-4',
  download: 'M12 4v11.5 M7 11l5 5 5-5 M4.5 15.5v4h15v-4',
  edit: 'M4.5 19.5l.8-4L15.7 5.1l3.2 3.2L8.5 18.7z M13.2 7.6l3.2 3.2',
  delete: 'M4.5 7h15 M9.5 7V4.5h5V7 M6.5 7l.8 12.5h9.4L17.5 7 M10.2 11v5 M13.8 11v5',
  undo: 'M8.5 5 4 9.5 8.5 14 M4.5 9.5H15a5 5 0 0 1 0 10h-3.5',
  redo: 'M15.5 5 20 9.5 15.5 14 M19.5 9.5H9a5 5 0 0 0 0 10h3.5',
  warn: 'M12 4 21 19.5H3z M12 10v4.5 M12 17v.2',
  stop: 'M8.2 3.5h7.6l4.7 4.7v7.6l-4.7 4.7H8.2l-4.7-4.7V8.2z M12 7.5v5.5 M12 16v.2',
  info: 'M12 3.5a8.5 8.5 0 1 1 0 17 8.5 8.5 0 0 1 0-17z M12 11v5.5 M12 7.6v.2',
  person: 'M12 4.5a3.5 3.5 0 1 1 0 7 3.5 3.5 0 0 1 0-7z M5 19.5c.6-3.6 3.4-5 7-5s6.4 1.4 7 5',
  team: 'M9 5.5a3 3 0 1 1 0 6 3 3 0 0 1 0-6z M2.8 18.8c.4-3 2.8-4.3 6.2-4.3s5.8 1.3 6.2 4.3 M16 6a2.7 2.7 0 0 1 0 5.2 M17.5 14.7c2.1.4 3.4 1.7 3.7 4.1',
  mail: 'M3.5 6h17v12.5h-17z M3.8 6.5 12 13l8.2-6.5',
  vehicle:
    'M3.5 15.5v-4l2-5h10l5 5v4z M7.5 13.7a1.9 1.9 0 1 1 0 3.8 1.9 1.9 0 0 1 0-3.8z M16.5 13.7a1.9 1.9 0 1 1 0 3.8 1.9 1.9 0 0 1 0-3.8z',
  pin: 'M9 4h6 M10 4v6l-3 3.5h10L14 10V4 M12 13.5V20',
  play: 'M7.5 5v14l11-7z',
  copy: 'M9 9h11v11H9z M5.5 15H4V4h11v1.5',
  file: 'M6 3.5h8l4.5 4.5v12.5H6z M14 3.5V8h4.5',
  keyboard: 'M3 6.5h18v11H3z M6.5 10h.2 M10 10h.2 M13.8 10h.2 M17.3 10h.2 M8 14h8',
  compare: 'M4.5 5h6v14h-6z M13.5 5h6v14h-6z M4.5 12h6 M13.5 9h6',
  map: 'M4 6.5h5 M4 12h5 M4 17.5h5 M15 6.5h5 M15 12h5 M15 17.5h5 M9 6.5l6 5.5 M9 12l6-5.5 M9 17.5h6',
  sun: 'M12 8a4 4 0 1 1 0 8 4 4 0 0 1 0-8z M12 2.8v2 M12 19.2v2 M2.8 12h2 M19.2 12h2 M5.5 5.5l1.4 1.4 M17.1 17.1l1.4 1.4 M18.5 5.5l-1.4 1.4 M6.9 17.1l-1.4 1.4',
  moon: 'M19.5 14.2A8 8 0 0 1 9.8 4.5a8 8 0 1 0 9.7 9.7z',
  leave: 'M10 4.5H4.5v15H10 M9.5 12H20 M16 8l4 4-4 4',
  link: 'M13.5 4.5h6v6 M19 5l-8.5 8.5 M17.5 14v5.5h-13v-13H10',
  chart: 'M4 4v16h16 M7.5 15.5l3.5-5 3 2.5 4.5-6.5',
  schedule: 'M3.5 20h17 M5.5 20V9h3v11 M11 20V9h3v11 M16.5 20V9h3v11 M5 4.5h14',
  fit: 'M4 9V4h5 M20 9V4h-5 M4 15v5h5 M20 15v5h-5',
  outage: 'M6 4v16 M18 4v16 M6 11l7-7 M6 17 18 5 M9 20l9-9 M15 20l3-3',
} as const;
