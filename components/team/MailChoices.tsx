import { StyleSheet, View } from 'react-native';
import { Card } from '@/components/ui/Card';
import { messageOf } from '@/components/ui/ErrorState';
import { Text } from '@/components/ui/Text';
import { Toggle } from '@/components/ui/Toggle';
import { useToast } from '@/components/ui/ToastProvider';
import { space } from '@/constants/theme';
import { usePatchPreferences, usePreferences } from '@/hooks/preferences';
import { LETTERS, wantsLetter, type LetterKind } from '@/shared/contracts/preferences';

const WORDS: Record<LetterKind, { label: string; hint: string }> = {
  reviewAsked: {
    label: 'Review asked',
    hint: 'When somebody submits a version where you are an approver, unless you wrote it.',
  },
  returned: { label: 'Returned', hint: 'When a version that you wrote or submitted is returned.' },
  released: { label: 'Released', hint: 'When a version that you wrote or submitted is released.' },
  anyReleased: { label: 'Every release', hint: 'When anybody’s version is released in your workspaces.' },
  verificationFailed: {
    label: 'Verification failed',
    hint: 'When a verification that you started has ended and cells of it failed. Once, not cell by cell.',
  },
};

/** Which letters this person gets, in every workspace. */
export function MailChoices() {
  const preferences = usePreferences();
  const patch = usePatchPreferences();
  const toast = useToast();
  const choose = async (kind: LetterKind, wanted: boolean) => {
    try {
      await patch.mutateAsync({ letters: { ...preferences.letters, [kind]: wanted } });
    } catch (error) {
      toast({ message: `Your letters are as before: ${messageOf(error)}`, tone: 'vermilion' });
    }
  };
  return (
    <Card title="E-mail">
      <Text variant="label" tone="soft">
        Which letters you get, from every workspace you belong to. Invitations and password resets always
        come.
      </Text>
      <View style={styles.list}>
        {LETTERS.map((kind) => (
          <Toggle
            key={kind}
            {...WORDS[kind]}
            value={wantsLetter(preferences, kind)}
            onChange={(wanted) => void choose(kind, wanted)}
          />
        ))}
      </View>
    </Card>
  );
}

const styles = StyleSheet.create({ list: { gap: space.s } });
