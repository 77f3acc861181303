import { Pressable, ScrollView, StyleSheet } from 'react-native';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { web } from '@/components/ui/web-props';
import { space, touchTarget } from '@/constants/theme';

export interface ViewTabsProps<T extends string> {
  views: readonly { id: T; label: string }[];
  value: T;
  onChange: (value: T) => void;
  label?: string;
}

/** A row of names, the chosen one underlined; arrows move along it. Scrolls sideways where it is longer than the screen. */
export function ViewTabs<T extends string>({ views, value, onChange, label = 'Charts' }: ViewTabsProps<T>) {
  const { palette } = useTheme();
  const step = (by: number) => {
    const at = views.findIndex((view) => view.id === value);
    const next = views[(at + by + views.length) % views.length];
    if (!next) return;
    onChange(next.id);
    if (typeof document !== 'undefined') document.getElementById(tabId(label, next.id))?.focus();
  };
  return (
    <ScrollView
      horizontal
      showsHorizontalScrollIndicator={false}
      style={styles.scroll}
      contentContainerStyle={styles.row}
      role="tablist"
      aria-label={label}
      {...web({
        onKeyDown: (event) => {
          const by = event.key === 'ArrowRight' ? 1 : event.key === 'ArrowLeft' ? -1 : 0;
          if (by === 0) return;
          event.preventDefault();
          step(by);
        },
      })}
    >
      {views.map((view) => {
        const chosen = view.id === value;
        return (
          <Pressable
            key={view.id}
            nativeID={tabId(label, view.id)}
            role="tab"
            aria-selected={chosen}
            onPress={() => onChange(view.id)}
            {...web({ tabIndex: chosen ? 0 : -1 })}
            style={[styles.tab, { borderBottomColor: chosen ? palette.petrol : 'transparent' }]}
          >
            <Text variant="label" strong tone={chosen ? 'petrol' : 'soft'}>
              {view.label}
            </Text>
          </Pressable>
        );
      })}
    </ScrollView>
  );
}

const tabId = (label: string, id: string) => `tab-${label}-${id}`.replace(/[^\w-]/g, '-');

const styles = StyleSheet.create({
  scroll: { flexGrow: 1, flexShrink: 1 },
  row: { flexDirection: 'row' },
  tab: {
    minHeight: touchTarget,
    justifyContent: 'center',
    paddingHorizontal: space.m,
    borderBottomWidth: 2,
  },
});
