/** The tokens of the look: no other file of the client names a colour, a size or a font. Those that reports are drawn with too live in shared/tokens.ts. */

import { FALLBACK } from '@/shared/tokens';

export { axisDash, palettes, pictureFonts, typeScale, type Palette } from '@/shared/tokens';

export const fonts = {
  text: `Barlow_400Regular, ${FALLBACK}`,
  textStrong: `Barlow_600SemiBold, ${FALLBACK}`,
  label: `BarlowSemiCondensed_500Medium, ${FALLBACK}`,
  labelStrong: `BarlowSemiCondensed_600SemiBold, ${FALLBACK}`,
  /** Digits alone: words beside them are Semi Condensed. */
  number: 'AzeretMono_400Regular, ui-monospace, Menlo, Consolas, monospace',
} as const;

/** Spacing in fours. */
export const space = { xs: 4, s: 8, m: 12, l: 16, xl: 24, xxl: 32 } as const;
export const radius = 6;
export const hairline = 1;
export const touchTarget = 44;
export const breakpoints = { wide: 900, extraWide: 1280 } as const;
export const motionMs = 160;
