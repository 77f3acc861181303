import { usePathname } from 'expo-router';

/** The id in a path like /recordings/<id>/mapping, as far as there is one. */
export function usePathId(place: string): string | undefined {
  const [, first, second] = usePathname().split('/');
  return first === place && second && second.length === UUID_LENGTH ? second : undefined;
}

const UUID_LENGTH = 36;
