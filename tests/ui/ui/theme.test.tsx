import { act, renderHook } from '@testing-library/react-native';
import { ThemeProvider, useTheme } from '@/components/ui/ThemeProvider';
import { palettes } from '@/constants/theme';

const held = new Map<string, string>();
beforeEach(() => held.clear());
beforeAll(() => {
  Object.defineProperty(globalThis, 'localStorage', {
    configurable: true,
    value: {
      getItem: (key: string) => held.get(key) ?? null,
      setItem: (key: string, value: string) => void held.set(key, value),
      removeItem: (key: string) => void held.delete(key),
    },
  });
});

const theme = () => renderHook(() => useTheme(), { wrapper: ThemeProvider });

test('a choice changes the palette and outlives the page', () => {
  const first = theme();
  act(() => first.result.current.setChoice('night'));
  expect(first.result.current.palette).toBe(palettes.night);
  first.unmount();
  expect(theme().result.current).toMatchObject({ choice: 'night', name: 'night' });
});

test('"as the device" forgets the choice', () => {
  const { result } = theme();
  act(() => result.current.setChoice('night'));
  act(() => result.current.setChoice('system'));
  expect(held.size).toBe(0);
  expect(result.current.choice).toBe('system');
});
