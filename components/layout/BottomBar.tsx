import { StyleSheet, View } from 'react-native';
import { useTheme } from '@/components/ui/ThemeProvider';
import { hairline, space } from '@/constants/theme';
import { isAt, MAIN_PLACES, MORE, type Place } from './places';
import { PlaceLink } from './PlaceLink';

/** The phone's places, under the thumb. */
export function BottomBar({ path, more }: { path: string; more: readonly Place[] }) {
  const { palette } = useTheme();
  const underMore = [MORE, ...more].some((place) => isAt(path, place.href));
  return (
    <View
      role="navigation"
      aria-label="Places"
      style={[styles.bar, { backgroundColor: palette.ground, borderTopColor: palette.rule }]}
    >
      {MAIN_PLACES.map((place) => (
        <PlaceLink key={place.name} place={place} current={isAt(path, place.href)} shape="bar" />
      ))}
      <PlaceLink place={MORE} current={underMore} shape="bar" />
    </View>
  );
}

const styles = StyleSheet.create({
  bar: {
    flexDirection: 'row',
    borderTopWidth: hairline,
    paddingHorizontal: space.xs,
    paddingVertical: space.xs,
  },
});
