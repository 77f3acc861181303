/**
 * The tokens that drawings are made with, on the screen, in saved pictures and in reports. The client takes them from
 * constants/theme.ts, with the rest of the look.
 */

export interface Palette {
  ground: string;
  sheet: string;
  well: string;
  rule: string;
  ink: string;
  inkSoft: string;
  petrol: string;
  /** Text and icons on petrol. */
  onPetrol: string;
  vermilion: string;
  pine: string;
  ochre: string;
  north: string;
  east: string;
  down: string;
  ghost: string;
  /** The strip's speed profile. */
  profile: string;
  /** Behind a sheet that floats. */
  scrim: string;
}

export const palettes: Record<'paper' | 'night', Palette> = {
  paper: {
    ground: '#F5F2EA',
    sheet: '#FFFDF8',
    well: '#ECE7DB',
    rule: '#D8D1C0',
    ink: '#1C2629',
    inkSoft: '#55605F',
    petrol: '#0F5E6B',
    onPetrol: '#FFFDF8',
    vermilion: '#C53E29',
    pine: '#2C6E49',
    ochre: '#8A5F00',
    north: '#3A4EA1',
    east: '#B0661B',
    down: '#8A2F6B',
    ghost: '#A9A491',
    profile: '#454D4F',
    scrim: 'rgba(28, 38, 41, 0.32)',
  },
  night: {
    ground: '#12181A',
    sheet: '#1A2225',
    well: '#0D1213',
    rule: '#2E393C',
    ink: '#E9E4D8',
    inkSoft: '#A5ADA8',
    petrol: '#58B4C2',
    onPetrol: '#12181A',
    vermilion: '#F0765F',
    pine: '#74B78E',
    ochre: '#D9A93F',
    north: '#8D9BE6',
    east: '#E0A064',
    down: '#D585B8',
    ghost: '#5B6460',
    profile: '#C3BFB4',
    scrim: 'rgba(0, 0, 0, 0.5)',
  },
};

/** Behind the bundled faces: Greek letters (σ, χ) that Barlow lacks, and everything until the fonts have loaded. */
export const FALLBACK = '"Noto Sans", "Segoe UI", "Helvetica Neue", Arial, system-ui, sans-serif';
/** In saved pictures, by the families' own names: another machine may have them, and has something like them. */
export const pictureFonts = {
  label: `"Barlow Semi Condensed", Barlow, "Arial Narrow", ${FALLBACK}`,
  number: '"Azeret Mono", ui-monospace, Menlo, Consolas, "DejaVu Sans Mono", monospace',
} as const;

export const typeScale = { small: 12, label: 14, body: 16, heading: 20, title: 28 } as const;

/** Dash patterns, so that colour is never alone. */
export const axisDash = { north: undefined, east: '6 3', down: '1.5 3' } as const;
