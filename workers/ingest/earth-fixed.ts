/** Earth-centred, Earth-fixed positions and velocities (WGS-84) as a log of fixes needs them. */
import { RAD_PER_DEG } from '@/shared/units';
import { ecefToGeodetic } from '../engine/geodesy';

const place = new Float64Array(3);

/** x, y, z in metres; height above the ellipsoid. */
export function earthFixedToGeodetic(
  x: number,
  y: number,
  z: number,
): { latDeg: number; lonDeg: number; heightM: number } {
  ecefToGeodetic(x, y, z, place);
  return { latDeg: place[0]! / RAD_PER_DEG, lonDeg: place[1]! / RAD_PER_DEG, heightM: place[2]! };
}

/** An Earth-fixed vector as north, east, down at a place, in the same unit. */
export function earthFixedToNed(
  x: number,
  y: number,
  z: number,
  latDeg: number,
  lonDeg: number,
): [number, number, number] {
  const [lat, lon] = [latDeg * RAD_PER_DEG, lonDeg * RAD_PER_DEG];
  const outward = Math.cos(lon) * x + Math.sin(lon) * y;
  return [
    Math.cos(lat) * z - Math.sin(lat) * outward,
    Math.cos(lon) * y - Math.sin(lon) * x,
    -(Math.cos(lat) * outward + Math.sin(lat) * z),
  ];
}
