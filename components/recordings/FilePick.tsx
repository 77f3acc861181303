import { getDocumentAsync } from 'expo-document-picker';
import { useEffect, useRef, useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Figures } from '@/components/ui/Figures';
import { Icon } from '@/components/ui/Icon';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, radius, space } from '@/constants/theme';
import { formatBytes } from '@/shared/format';

export interface FilePickProps {
  /** "IMU log" */
  label: string;
  hint: string;
  file: File | undefined;
  onPick: (file: File | undefined) => void;
  error?: string;
  optional?: boolean;
  disabled?: boolean;
}

/** One file of an upload: chosen with the browser's dialogue or dropped on it. */
export function FilePick({ label, hint, file, onPick, error, optional, disabled }: FilePickProps) {
  const { palette } = useTheme();
  const [over, setOver] = useState(false);
  const box = useDrop((dropped) => !disabled && onPick(dropped), setOver);
  const pick = async () => {
    const result = await getDocumentAsync({ multiple: false, copyToCacheDirectory: false, base64: false });
    const chosen = result.canceled ? undefined : result.assets[0]?.file;
    if (chosen) onPick(chosen);
  };
  return (
    <View
      ref={box}
      role="group"
      aria-label={label}
      style={[
        styles.box,
        { borderColor: error ? palette.vermilion : over ? palette.petrol : palette.rule },
        file ? { backgroundColor: palette.sheet, borderStyle: 'solid' } : { backgroundColor: palette.well },
      ]}
    >
      <Icon name={file ? 'check' : 'file'} tone={file ? 'pine' : 'soft'} />
      <View style={styles.words}>
        <Text variant="body" strong>
          {label}
          {optional ? (
            <Text variant="label" tone="soft">
              {'  optional'}
            </Text>
          ) : null}
        </Text>
        {file ? (
          <Figures tone="soft">{`${file.name} · ${formatBytes(file.size)}`}</Figures>
        ) : (
          <Text variant="label" tone="soft">
            {hint}
          </Text>
        )}
        {error ? (
          <Text variant="label" tone="vermilion" role="alert">
            {error}
          </Text>
        ) : null}
      </View>
      <View style={styles.buttons}>
        <Button
          label={file ? 'Change' : 'Choose'}
          aria-label={`${file ? 'Change' : 'Choose'} the ${label}`}
          disabled={disabled}
          onPress={() => void pick()}
        />
        {file && optional ? (
          <Button
            label={`Leave out the ${label}`}
            icon="close"
            iconOnly
            kind="plain"
            onPress={() => onPick(undefined)}
          />
        ) : null}
      </View>
    </View>
  );
}

/** Takes a file that is dropped on the element. */
function useDrop(onDrop: (file: File) => void, onOver: (over: boolean) => void) {
  const box = useRef<View>(null);
  const handlers = useRef({ onDrop, onOver });
  useEffect(() => {
    handlers.current = { onDrop, onOver };
  });
  useEffect(() => {
    const element = box.current as unknown;
    if (typeof HTMLElement === 'undefined' || !(element instanceof HTMLElement)) return;
    const over = (event: DragEvent) => {
      event.preventDefault();
      handlers.current.onOver(true);
    };
    const leave = () => handlers.current.onOver(false);
    const drop = (event: DragEvent) => {
      event.preventDefault();
      leave();
      const file = event.dataTransfer?.files[0];
      if (file) handlers.current.onDrop(file);
    };
    element.addEventListener('dragover', over);
    element.addEventListener('dragleave', leave);
    element.addEventListener('drop', drop);
    return () => {
      element.removeEventListener('dragover', over);
      element.removeEventListener('dragleave', leave);
      element.removeEventListener('drop', drop);
    };
  }, []);
  return box;
}

const styles = StyleSheet.create({
  box: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    alignItems: 'center',
    gap: space.m,
    padding: space.m,
    borderRadius: radius,
    borderWidth: hairline,
    borderStyle: 'dashed',
    minHeight: 72,
  },
  words: { flex: 1, minWidth: 160 },
  buttons: { flexDirection: 'row', gap: space.xs },
});
