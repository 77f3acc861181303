import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Icon } from '@/components/ui/Icon';
import { Text } from '@/components/ui/Text';
import { space } from '@/constants/theme';

export interface TakenNoteProps {
  /** What was put into the form; null: nothing, or it is settled. */
  taken: string | null;
  onUndo: () => void;
  onClose: () => void;
}

/** Says what a press has changed in the form, with the way back. It covers nothing. */
export function TakenNote({ taken, onUndo, onClose }: TakenNoteProps) {
  return (
    <View role="status" aria-live="polite">
      {taken ? (
        <View style={styles.note}>
          <Icon name="check" tone="pine" size={20} />
          <Text variant="label" style={styles.words}>{`${taken}: put into the form.`}</Text>
          <Button label="Undo" icon="undo" kind="plain" onPress={onUndo} />
          <Button label="Keep it so" icon="close" iconOnly kind="plain" onPress={onClose} />
        </View>
      ) : null}
    </View>
  );
}

const styles = StyleSheet.create({
  note: { flexDirection: 'row', alignItems: 'center', gap: space.s },
  words: { flex: 1, minWidth: 0 },
});
