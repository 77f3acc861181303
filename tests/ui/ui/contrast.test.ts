import { palettes, type Palette } from '@/constants/theme';

/** Relative luminance and contrast ratio as WCAG 2.2 defines them. */
function luminance(hex: string): number {
  const [r, g, b] = [1, 3, 5].map((at) => {
    const c = parseInt(hex.slice(at, at + 2), 16) / 255;
    return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * r! + 0.7152 * g! + 0.0722 * b!;
}
function contrast(a: string, b: string): number {
  const [light, dark] = [luminance(a), luminance(b)].sort((x, y) => y - x);
  return (light! + 0.05) / (dark! + 0.05);
}

const WORDS: (keyof Palette)[] = ['ink', 'inkSoft', 'petrol', 'vermilion', 'pine', 'ochre'];
const GROUNDS: (keyof Palette)[] = ['ground', 'sheet'];

describe.each(Object.entries(palettes))('%s', (_, palette) => {
  test.each(WORDS.flatMap((word) => GROUNDS.map((ground) => [word, ground] as const)))(
    'words in %s on %s reach 4.5 : 1',
    (word, ground) => {
      expect(contrast(palette[word], palette[ground])).toBeGreaterThanOrEqual(4.5);
    },
  );
  test('words on petrol reach 4.5 : 1', () => {
    expect(contrast(palette.onPetrol, palette.petrol)).toBeGreaterThanOrEqual(4.5);
  });
});
