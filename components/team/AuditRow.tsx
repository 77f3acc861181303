import { useState } from 'react';
import { StyleSheet, View } from 'react-native';
import { Button } from '@/components/ui/Button';
import { Figures } from '@/components/ui/Figures';
import { formatMoment } from '@/components/ui/format-day';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { fonts, hairline, space } from '@/constants/theme';
import { actionWords } from '@/shared/audit-words';
import type { AuditEntry } from '@/shared/contracts/accounts';

/** One change; what was before and after when asked for. */
export function AuditRow({ entry }: { entry: AuditEntry }) {
  const { palette } = useTheme();
  const [open, setOpen] = useState(false);
  const { action, subject, actor, at, address, detail } = entry;
  const told = Object.keys(detail).length > 0;
  return (
    <View role="listitem" style={[styles.row, { borderTopColor: palette.rule }]}>
      <View style={styles.head}>
        <View style={styles.words}>
          <Text variant="label" strong>{`${actionWords(action)}: ${subject}`}</Text>
          <Figures variant="label" tone="soft">
            {[actor, formatMoment(at), address].filter(Boolean).join(' · ')}
          </Figures>
        </View>
        {told ? (
          <Button
            label={open ? 'Less' : `What changed in ${subject}`}
            icon={open ? 'up' : 'down'}
            iconOnly
            kind="plain"
            onPress={() => setOpen((was) => !was)}
          />
        ) : null}
      </View>
      {open ? (
        <Text variant="small" style={[styles.detail, { backgroundColor: palette.well }]}>
          {JSON.stringify(detail, null, 2)}
        </Text>
      ) : null}
    </View>
  );
}

const styles = StyleSheet.create({
  row: { borderTopWidth: hairline, paddingVertical: space.s, gap: space.s },
  head: { flexDirection: 'row', alignItems: 'center', gap: space.m },
  words: { flex: 1, minWidth: 0 },
  detail: { fontFamily: fonts.number, padding: space.m },
});
