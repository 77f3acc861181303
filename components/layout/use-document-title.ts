import { useIsFocused } from 'expo-router/react-navigation';
import { useEffect } from 'react';

/** The browser's title while this screen is the one in front. */
export function useDocumentTitle(title: string) {
  const focused = useIsFocused();
  useEffect(() => {
    if (focused && typeof document !== 'undefined') document.title = `${title} · Driftwright`;
  }, [focused, title]);
}
