import { createContext, useContext, useEffect, useMemo, useState, type ReactNode } from 'react';
import { useColorScheme } from 'react-native';
import { palettes, type Palette } from '@/constants/theme';

export type ThemeName = 'paper' | 'night';
export type ThemeChoice = 'system' | ThemeName;

interface Theme {
  name: ThemeName;
  palette: Palette;
  choice: ThemeChoice;
  setChoice: (choice: ThemeChoice) => void;
}

const STORAGE_KEY = 'driftwright.theme';
const ThemeContext = createContext<Theme | null>(null);

/** Holds paper or night; the choice stays in the browser, `system` follows the device. */
export function ThemeProvider({ children }: { children: ReactNode }) {
  const device = useColorScheme();
  const [choice, setChoice] = useState<ThemeChoice>(storedChoice);
  const name: ThemeName = choice === 'system' ? (device === 'dark' ? 'night' : 'paper') : choice;
  const theme = useMemo<Theme>(
    () => ({
      name,
      palette: palettes[name],
      choice,
      setChoice: (next) => {
        setChoice(next);
        store(next);
      },
    }),
    [name, choice],
  );
  useEffect(() => paintDocument(name), [name]);
  return <ThemeContext.Provider value={theme}>{children}</ThemeContext.Provider>;
}

/** The theme in force: its palette, its name and the person's choice. */
export function useTheme(): Theme {
  const theme = useContext(ThemeContext);
  if (!theme) throw new Error('useTheme needs a ThemeProvider above it.');
  return theme;
}

function storedChoice(): ThemeChoice {
  try {
    const stored = globalThis.localStorage?.getItem(STORAGE_KEY);
    return stored === 'paper' || stored === 'night' ? stored : 'system';
  } catch {
    return 'system'; // storage may be forbidden
  }
}

function store(choice: ThemeChoice) {
  try {
    if (choice === 'system') globalThis.localStorage?.removeItem(STORAGE_KEY);
    else globalThis.localStorage?.setItem(STORAGE_KEY, choice);
  } catch {
    // storage may be forbidden: the choice then lasts as long as the page
  }
}

/** Ground, scroll bars, focus ring and the browser's own bars follow the theme. */
function paintDocument(name: ThemeName) {
  if (typeof document === 'undefined') return;
  const palette = palettes[name];
  const style =
    document.getElementById('driftwright-theme') ??
    document.head.appendChild(document.createElement('style'));
  style.id = 'driftwright-theme';
  style.textContent = `
    :root { color-scheme: ${name === 'night' ? 'dark' : 'light'}; background: ${palette.ground}; }
    body { background: ${palette.ground}; overflow: hidden; }
    :focus-visible { outline: 2px solid ${palette.petrol} !important; outline-offset: 2px; }
    :focus:not(:focus-visible) { outline: none; }
    ::selection { background: ${palette.petrol}; color: ${palette.onPetrol}; }
    ::placeholder { color: ${palette.inkSoft}; opacity: 1; }
    dialog::backdrop { background: ${palette.scrim}; }
    @media (prefers-reduced-motion: reduce) {
      *, ::before, ::after { animation-duration: 0.01ms !important; transition-duration: 0.01ms !important; }
    }
  `;
  const meta =
    document.querySelector<HTMLMetaElement>('meta[name="theme-color"]') ??
    document.head.appendChild(Object.assign(document.createElement('meta'), { name: 'theme-color' }));
  meta.content = palette.ground;
}
