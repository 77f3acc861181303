/** What every component test gets: the fonts count as loaded, so that text shows at once. */
jest.mock('expo-font', () => ({
  ...jest.requireActual<object>('expo-font'),
  isLoaded: () => true,
  useFonts: () => [true, null],
}));
