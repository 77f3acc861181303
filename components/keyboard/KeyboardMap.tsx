import { Fragment } from 'react';
import { StyleSheet, View } from 'react-native';
import { Dialog } from '@/components/ui/Dialog';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { Toggle } from '@/components/ui/Toggle';
import { hairline, space } from '@/constants/theme';
import { KEY_MAP, type KeyLine } from './key-map';
import { setSingleKeys, useSingleKeys } from './single-keys';

/** Which keys there are, by where they are heard. */
export function KeyboardMap({ onClose }: { onClose: () => void }) {
  const on = useSingleKeys();
  return (
    <Dialog open title="Keyboard" onClose={onClose} width={720}>
      <View style={styles.groups}>
        {KEY_MAP.map(({ title, where, lines }) => (
          <View key={title} style={styles.group}>
            <Text variant="label" strong level={3}>
              {title}
            </Text>
            <Text variant="small" tone="soft">
              {where}
            </Text>
            {lines.map((line) => (
              <Line key={line.does} line={line} />
            ))}
          </View>
        ))}
      </View>
      <Toggle
        label="Single keys"
        hint="Letters, digits and ? alone. Off: only keys with Ctrl or ⌘, and those of what is in focus."
        value={on}
        onChange={setSingleKeys}
      />
    </Dialog>
  );
}

function Line({ line: { keys, then, does } }: { line: KeyLine }) {
  return (
    <View style={styles.line}>
      <View style={styles.keys}>
        {keys.map((key, i) => (
          <Fragment key={key}>
            {i > 0 ? (
              <Text variant="small" tone="soft">
                {then ? 'then' : '+'}
              </Text>
            ) : null}
            <Cap name={key} />
          </Fragment>
        ))}
      </View>
      <Text variant="label" style={styles.does}>
        {does}
      </Text>
    </View>
  );
}

function Cap({ name }: { name: string }) {
  const { palette } = useTheme();
  return (
    <View style={[styles.cap, { borderColor: palette.rule, backgroundColor: palette.well }]}>
      <Text variant="label" strong>
        {name}
      </Text>
    </View>
  );
}

const styles = StyleSheet.create({
  groups: { flexDirection: 'row', flexWrap: 'wrap', gap: space.xl },
  group: { flexGrow: 1, flexBasis: 300, minWidth: 0, gap: space.xs },
  line: { flexDirection: 'row', alignItems: 'center', gap: space.m, minHeight: 32 },
  keys: { flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', gap: space.xs, width: 132 },
  does: { flex: 1, minWidth: 0 },
  cap: { borderWidth: hairline, borderRadius: 4, paddingHorizontal: 6, paddingVertical: 1 },
});
