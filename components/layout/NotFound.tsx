import { usePathname } from 'expo-router';
import { Notice } from '@/components/ui/Notice';
import { TextLink } from '@/components/ui/TextLink';
import { Screen } from './Screen';

/** An address that leads nowhere. */
export function NotFound() {
  const path = usePathname();
  return (
    <Screen title="No such page" width="text">
      <Notice tone="ochre" title="Nothing is kept at this address">
        {`${path} leads nowhere. It may have been typed or copied with a piece missing.`}
      </Notice>
      <TextLink href="/" label="To the first page" />
    </Screen>
  );
}
