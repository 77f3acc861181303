import { router } from 'expo-router';
import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Card } from '@/components/ui/Card';
import { FileLink } from '@/components/ui/FileLink';
import { Text } from '@/components/ui/Text';
import { TypedConfirm } from '@/components/ui/TypedConfirm';
import { space } from '@/constants/theme';
import { useSession } from '@/hooks/session';
import { useDeleteWorkspace, workspaceExportUrl } from '@/hooks/workspace';

/** All data of the workspace, to take away or to delete. */
export function WorkspaceCard() {
  const [asking, setAsking] = useState(false);
  const { workspace } = useSession();
  return (
    <Card title="Workspace">
      <View style={styles.row}>
        <Text variant="label" tone="soft" style={styles.words}>
          Uploads as they came; recordings, runs, sets, verifications and the audit trail as JSON.
        </Text>
        <FileLink href={workspaceExportUrl()} label="Export all data" of={`All data of ${workspace.name}`} />
      </View>
      <View style={styles.row}>
        <Text variant="label" tone="soft" style={styles.words}>
          Deleting takes everything with it, for everybody in it.
        </Text>
        <Button label="Delete the workspace" kind="danger" icon="delete" onPress={() => setAsking(true)} />
      </View>
      {asking ? <DeleteWorkspace name={workspace.name} onClose={() => setAsking(false)} /> : null}
    </Card>
  );
}

function DeleteWorkspace({ name, onClose }: { name: string; onClose: () => void }) {
  const remove = useDeleteWorkspace();
  const confirm = async (typed: string) => {
    try {
      await remove.mutateAsync(typed);
      router.replace('/');
    } catch {
      // shown by the dialog from the mutation's own state
    }
  };
  return (
    <TypedConfirm
      name={name}
      title={`Delete ${name}?`}
      message="Its recordings and their files, runs, sets with what was released, requirements, tokens and members: all of it goes, for everybody. This cannot be undone. Export the data first."
      confirmLabel="Delete the workspace"
      busy={remove.isPending}
      error={remove.error}
      onConfirm={(typed) => void confirm(typed)}
      onClose={onClose}
    />
  );
}

const styles = StyleSheet.create({
  row: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', gap: space.m },
  words: { flexGrow: 1, flexShrink: 1, flexBasis: 220, minWidth: 0 },
});
