import { router, type Href } from 'expo-router';
import { Button } from '@/components/ui/Button';

/** Back in the history, or to the page above when this one was opened directly. */
export function BackButton({ fallback }: { fallback: Href }) {
  return (
    <Button
      label="Back"
      icon="back"
      iconOnly
      kind="plain"
      onPress={() => (router.canGoBack() ? router.back() : router.replace(fallback))}
    />
  );
}
