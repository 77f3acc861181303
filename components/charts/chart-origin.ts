/** Whence the charts below come: for footers and file names of what is saved. Null: nothing can be saved here. */
import { createContext, useContext } from 'react';
import type { Origin } from '@/shared/charts/figure/sheet';

export const ChartOrigin = createContext<Origin | null>(null);

export const useChartOrigin = (): Origin | null => useContext(ChartOrigin);

/** Of a recording's own channels: no run is behind them. */
export const originOf = (recording: string): Origin => ({ recording, run: null, engineVersion: null });
