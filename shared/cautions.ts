/** What is said wherever a set is released, exported or reported. */
export const CAUTIONS: readonly string[] = [
  'This is engineering evidence, not certification.',
  'Check the parameters on the vehicle before they are relied on.',
  'Keep to the rules of the vehicle’s domain where it operates, and to licensed practice.',
  'Keep an independent means of navigation.',
];
