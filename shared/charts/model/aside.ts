/** The words beside a chart's unit: what lies beyond the scale, what is compared with what. */
import { formatNumber } from '@/shared/format';
import type { ChartContent } from './layers';
import type { ChartDrawing } from './time-chart';

export function asideOf(content: ChartContent, beyond: ChartDrawing['beyond']): string {
  return [beyondText(beyond, content.unit), content.remark?.()].filter(Boolean).join(' · ');
}

const beyondText = ({ count, largest }: ChartDrawing['beyond'], unit: string) =>
  count === 0
    ? ''
    : `${count} beyond the scale, largest ${formatNumber(largest, 3)}${unit ? ` ${unit}` : ''}`;
