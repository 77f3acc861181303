import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { KeyboardMap } from './KeyboardMap';

/** The way to the map for those who do not know its key. */
export function KeyboardButton() {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button label="Keyboard" icon="keyboard" iconOnly kind="plain" onPress={() => setOpen(true)} />
      {open ? <KeyboardMap onClose={() => setOpen(false)} /> : null}
    </>
  );
}
