import { router } from 'expo-router';
import { TabTrigger } from 'expo-router/ui';
import { Pressable, StyleSheet, type PressableProps } from 'react-native';
import { Icon } from '@/components/ui/Icon';
import { Text } from '@/components/ui/Text';
import { useTheme } from '@/components/ui/ThemeProvider';
import { web } from '@/components/ui/web-props';
import { hairline, radius, space } from '@/constants/theme';
import type { Place } from './places';

export interface PlaceLinkProps {
  place: Place;
  current: boolean;
  shape: 'bar' | 'rail';
}

/** One place in the bar or the rail; pressed while current it leads back to the place's first page. */
export function PlaceLink({ place, current, shape }: PlaceLinkProps) {
  return (
    <TabTrigger
      name={place.name}
      asChild
      onPress={() => {
        if (current) router.navigate(place.href);
      }}
    >
      <PlaceButton place={place} current={current} shape={shape} />
    </TabTrigger>
  );
}

function PlaceButton({
  place,
  current,
  shape,
  href,
  isFocused: _focused,
  ...press
}: PlaceLinkProps & PressableProps & { isFocused?: boolean; href?: string }) {
  const { palette } = useTheme();
  const rail = shape === 'rail';
  return (
    <Pressable
      {...press}
      role="link"
      {...web({ href: href ?? place.href, 'aria-current': current ? 'page' : undefined })}
      style={[
        styles.base,
        rail ? styles.rail : styles.bar,
        { borderColor: 'transparent' },
        rail && current ? { backgroundColor: palette.sheet, borderColor: palette.rule } : null,
      ]}
    >
      <Icon name={place.icon} size={22} tone={current ? 'petrol' : 'soft'} />
      <Text variant="label" strong={current} tone={current ? 'petrol' : 'soft'} align="center">
        {place.label}
      </Text>
    </Pressable>
  );
}

const styles = StyleSheet.create({
  base: {
    alignItems: 'center',
    justifyContent: 'center',
    gap: 2,
    borderWidth: hairline,
    borderRadius: radius,
    minHeight: 56,
  },
  bar: { flex: 1, minWidth: 0, paddingVertical: space.xs },
  rail: { alignSelf: 'stretch', paddingVertical: space.s, minHeight: 58 },
});
