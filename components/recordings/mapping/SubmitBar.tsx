import { StyleSheet, View } from 'react-native';
import { useBreakpoint } from '@/components/layout/use-breakpoint';
import { Button } from '@/components/ui/Button';
import { Figures } from '@/components/ui/Figures';
import { Icon } from '@/components/ui/Icon';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space } from '@/constants/theme';
import type { MapPreview } from '@/shared/contracts/recordings';
import { gravityCheck, openFindings } from './preview-checks';

export interface SubmitBarProps {
  busy: boolean;
  preview: MapPreview | undefined;
  computing: boolean;
  onSubmit: () => void;
  /** Scrolls to the preview; on the phone it lies below the fields. */
  onLook: () => void;
  /** Above the line, on the phone. */
  children?: React.ReactNode;
}

/** The deed, within reach of the thumb on the phone, with what the preview says of the map so far. */
export function SubmitBar({ busy, preview, computing, onSubmit, onLook, children }: SubmitBarProps) {
  const { palette } = useTheme();
  const { extraWide } = useBreakpoint();
  const send = (
    <Button
      label="Use this map and decode"
      kind="primary"
      icon="check"
      busy={busy}
      wide={!extraWide}
      onPress={onSubmit}
    />
  );
  if (extraWide) return <View style={styles.end}>{send}</View>;
  const { words, tone } = summaryOf(preview, computing);
  return (
    <View style={[styles.bar, STICKY, { backgroundColor: palette.ground, borderTopColor: palette.rule }]}>
      {children}
      <View style={styles.line}>
        <Icon name={ICONS[tone]} tone={tone} size={20} />
        <Figures style={styles.words}>{words}</Figures>
        <Button label="Look" aria-label="Look at the preview" kind="plain" onPress={onLook} />
      </View>
      {send}
    </View>
  );
}

/** The preview in a line. */
function summaryOf(
  preview: MapPreview | undefined,
  computing: boolean,
): {
  words: string;
  tone: 'pine' | 'ochre' | 'vermilion' | 'soft';
} {
  if (!preview)
    return { words: computing ? 'The first rows are being read' : 'No preview yet', tone: 'soft' };
  const count = preview.problems.length;
  if (preview.outcome !== 'ready')
    return { words: count === 1 ? 'One problem stops it' : `${count} problems stop it`, tone: 'vermilion' };
  const gravity = gravityCheck(preview);
  const found = openFindings(preview);
  const words = [gravity ? `Gravity ${gravity.words}` : '', counted(found.length)].filter(Boolean).join('; ');
  const stops = found.some(({ severity }) => severity === 'stop');
  return { words, tone: stops ? 'vermilion' : found.length > 0 ? 'ochre' : (gravity?.tone ?? 'soft') };
}

const counted = (count: number) => (count === 0 ? '' : count === 1 ? '1 finding' : `${count} findings`);
const ICONS = { pine: 'check', ochre: 'warn', vermilion: 'stop', soft: 'info' } as const;

/** Stays at the lower edge while the fields pass behind it; React Native's types do not know it. */
const STICKY: object = { position: 'sticky', bottom: 0 };

const styles = StyleSheet.create({
  end: { flexDirection: 'row', justifyContent: 'flex-end' },
  bar: { borderTopWidth: hairline, paddingVertical: space.s, gap: space.xs, zIndex: 5 },
  line: { flexDirection: 'row', alignItems: 'center', gap: space.s },
  words: { flex: 1, minWidth: 0 },
});
