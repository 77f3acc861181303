import { AzeretMono_400Regular } from '@expo-google-fonts/azeret-mono/400Regular';
import { Barlow_400Regular } from '@expo-google-fonts/barlow/400Regular';
import { Barlow_600SemiBold } from '@expo-google-fonts/barlow/600SemiBold';
import { BarlowSemiCondensed_500Medium } from '@expo-google-fonts/barlow-semi-condensed/500Medium';
import { BarlowSemiCondensed_600SemiBold } from '@expo-google-fonts/barlow-semi-condensed/600SemiBold';
import { useFonts } from 'expo-font';
import { useEffect, useState, type ReactNode } from 'react';

/** A slow line shows the page in fallback faces after this long, ms. */
const PATIENCE_MS = 1500;

/** Holds the first drawing until the bundled fonts are there, but never for long. */
export function AppFonts({ children }: { children: ReactNode }) {
  const [loaded, error] = useFonts({
    AzeretMono_400Regular,
    Barlow_400Regular,
    Barlow_600SemiBold,
    BarlowSemiCondensed_500Medium,
    BarlowSemiCondensed_600SemiBold,
  });
  const [waited, setWaited] = useState(false);
  useEffect(() => {
    const timer = setTimeout(() => setWaited(true), PATIENCE_MS);
    return () => clearTimeout(timer);
  }, []);
  return loaded || error || waited ? children : null;
}
