import Svg, { Circle, G, Path, Text as SvgText } from 'react-native-svg';
import { useTheme } from '@/components/ui/ThemeProvider';
import { axisDash, fonts, typeScale } from '@/constants/theme';
import type { AxisMap } from '@/shared/contracts/vehicles';
import { axesSentence, sensorDirections } from './axes';

/** The vehicle seen from above and behind, with the sensor's own x, y and z as they are mounted. */
export function AxisDrawing({ axes, size = 176 }: { axes: AxisMap; size?: number }) {
  const { palette } = useTheme();
  const directions = sensorDirections(axes);
  const colours = { x: palette.north, y: palette.east, z: palette.down };
  const dashes = { x: axisDash.north, y: axisDash.east, z: axisDash.down };
  return (
    <Svg
      width={size}
      height={size}
      viewBox="0 0 176 176"
      role="img"
      aria-label={`Sensor axes: ${axesSentence(axes)}`}
    >
      <Path d={HULL} fill={palette.well} stroke={palette.inkSoft} strokeWidth={1.25} strokeLinejoin="round" />
      <Path
        d={SIDE}
        fill={palette.ground}
        stroke={palette.inkSoft}
        strokeWidth={1.25}
        strokeLinejoin="round"
      />
      <SvgText
        x={168}
        y={42}
        fill={palette.inkSoft}
        fontFamily={fonts.label}
        fontSize={typeScale.small}
        textAnchor="end"
      >
        ahead
      </SvgText>
      {(['x', 'y', 'z'] as const).map((letter) => {
        const { along, sign } = directions[letter];
        const [dx, dy] = PROJECTION[along];
        const [x, y] = [CENTRE[0] + sign * dx * REACH, CENTRE[1] + sign * dy * REACH];
        const [lx, ly] = [CENTRE[0] + sign * dx * (REACH + 13), CENTRE[1] + sign * dy * (REACH + 13)];
        return (
          <G key={letter}>
            <Path
              d={`M${CENTRE[0]} ${CENTRE[1]}L${x} ${y}`}
              stroke={colours[letter]}
              strokeWidth={2.25}
              strokeDasharray={dashes[letter]}
            />
            <Path d={head(x, y, sign * dx, sign * dy)} fill={colours[letter]} />
            <SvgText
              x={lx}
              y={ly + 5}
              fill={colours[letter]}
              fontFamily={fonts.labelStrong}
              fontSize={typeScale.body}
              textAnchor="middle"
            >
              {letter}
            </SvgText>
          </G>
        );
      })}
      <Circle cx={CENTRE[0]} cy={CENTRE[1]} r={3.5} fill={palette.ink} />
    </Svg>
  );
}

const CENTRE = [84, 96] as const;
const REACH = 52;
/** Unit directions on the drawing. */
const PROJECTION: Record<keyof AxisMap, readonly [number, number]> = {
  forward: [0.82, -0.57],
  right: [0.87, 0.5],
  down: [0, 1],
};
const HULL = 'M34 108 L96 66 L130 58 L128 84 L68 128 Z';
const SIDE = 'M34 108 L68 128 L68 142 L34 122 Z';

/** A small arrow head at (x, y) along (dx, dy). */
function head(x: number, y: number, dx: number, dy: number): string {
  const [tipX, tipY] = [x + dx * 7, y + dy * 7];
  return `M${tipX} ${tipY}L${x - dy * 4} ${y + dx * 4}L${x + dy * 4} ${y - dx * 4}Z`;
}
