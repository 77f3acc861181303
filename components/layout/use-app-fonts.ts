import { AzeretMono_400Regular } from '@expo-google-fonts/azeret-mono/400Regular';
import { Barlow_400Regular } from '@expo-google-fonts/barlow/400Regular';
import { Barlow_600SemiBold } from '@expo-google-fonts/barlow/600SemiBold';
import { BarlowSemiCondensed_500Medium } from '@expo-google-fonts/barlow-semi-condensed/500Medium';
import { BarlowSemiCondensed_600SemiBold } from '@expo-google-fonts/barlow-semi-condensed/600SemiBold';
import { useFonts } from 'expo-font';
import { useEffect, useState } from 'react';

/** A slow line shows the page in fallback faces after this long, ms. */
const PATIENCE_MS = 1500;

/** True once the bundled fonts are there, or have been waited for long enough. */
export function useAppFonts(): boolean {
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
  return loaded || error !== null || waited;
}
