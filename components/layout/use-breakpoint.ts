import { useWindowDimensions } from 'react-native';
import { breakpoints } from '@/constants/theme';

export interface Breakpoint {
  /** Rail instead of bottom bar, master and detail side by side. */
  wide: boolean;
  /** Room for three columns. */
  extraWide: boolean;
  width: number;
  height: number;
}

/** The one place that names widths. */
export function useBreakpoint(): Breakpoint {
  const { width, height } = useWindowDimensions();
  return { wide: width >= breakpoints.wide, extraWide: width >= breakpoints.extraWide, width, height };
}
