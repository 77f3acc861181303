import { useEffect, useState } from 'react';
import { Path } from 'react-native-svg';
import type { ChartGroup } from '@/components/charts/chart-group';
import { ShapeSet } from '@/components/charts/drawing/shape-set';
import { useTheme } from '@/components/ui/ThemeProvider';
import type { StripGeometry } from './strip-model';

/** The cursor that all charts share, and under the profile what stretch they show. Set on the page without a render. */
export function SharedMarks({ geometry, group }: { geometry: StripGeometry; group: ChartGroup }) {
  const { palette } = useTheme();
  const [shapes] = useState(() => new ShapeSet());
  useEffect(() => {
    const draw = () => {
      const at = group.cursor.current;
      shapes.set(
        'cursor',
        at === null ? '' : `M${geometry.x(at).toFixed(1)} 0V${geometry.layout.tickBottom}`,
      );
      const [from, to] = group.viewport.current;
      const y = geometry.layout.baseY + 1.5;
      const view = `M${geometry.x(from).toFixed(1)} ${y}H${geometry.x(to).toFixed(1)}`;
      shapes.set('view', group.viewport.zoomed ? view : '');
      shapes.set('brush', brushPath(group, geometry));
    };
    draw();
    const stop = [group.cursor, group.viewport, group.brush].map((store) => store.subscribe(draw));
    return () => stop.forEach((unsubscribe) => unsubscribe());
  }, [geometry, group, shapes]);
  return (
    <>
      <Path ref={shapes.ref('brush')} d="" fill={palette.petrol} fillOpacity={0.16} />
      <Path ref={shapes.ref('view')} d="" stroke={palette.petrol} strokeWidth={3} />
      <Path ref={shapes.ref('cursor')} d="" stroke={palette.petrol} strokeWidth={1.5} />
    </>
  );
}

function brushPath({ brush }: ChartGroup, { x, layout }: StripGeometry): string {
  if (!brush.current) return '';
  const [left, right] = brush.current.map((timeS) => x(timeS).toFixed(1));
  return `M${left} 0H${right}V${layout.tickBottom}H${left}Z`;
}
