/** Height above sea level to height above the ellipsoid, by the EGM96 geoid. */

/** EGM96's grid is two megabytes: it is read only where a log needs it. `heightM` is changed in place. */
export async function seaLevelToEllipsoid(
  latDeg: Float64Array,
  lonDeg: Float64Array,
  heightM: Float64Array,
): Promise<void> {
  const { egm96ToEllipsoid } = await import('egm96-universal');
  for (let i = 0; i < heightM.length; i += 1)
    if (!Number.isNaN(heightM[i]! + latDeg[i]! + lonDeg[i]!))
      heightM[i] = egm96ToEllipsoid(latDeg[i]!, lonDeg[i]!, heightM[i]!);
}
