import { lazy } from 'react';

/**
 * A plot whose library comes when the first one is drawn. The library's chunk holds nothing but the drawing: what it shared with
 * others would be loaded with the first screen.
 */
export const FetchedPlot = lazy(async () => ({ default: (await import('./QuietPlot')).QuietPlot }));
