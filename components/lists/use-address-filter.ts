/** What a list is narrowed down by, kept in the address: a link, a reload and the way back show the same list. */
import { router, useGlobalSearchParams } from 'expo-router';
import { useMemo } from 'react';

export interface AddressFilter<K extends string> {
  /** Only what is set. */
  values: Partial<Record<K, string>>;
  /** How many are set. */
  count: number;
  set: (key: K, value: string) => void;
  clear: () => void;
}

/** `keys` are parameters of the query; a constant list. */
export function useAddressFilter<K extends string>(keys: readonly K[]): AddressFilter<K> {
  const params = useGlobalSearchParams() as Record<string, string | string[] | undefined>;
  const written = keys.map((key) => oneOf(params[key])).join('\n');
  return useMemo(() => {
    const parts = written.split('\n');
    const values = Object.fromEntries(
      keys.flatMap((key, i) => (parts[i] ? [[key, parts[i]]] : [])),
    ) as Partial<Record<K, string>>;
    return {
      values,
      count: Object.keys(values).length,
      set: (key, value) => router.setParams({ [key]: value || undefined }),
      clear: () => router.setParams(Object.fromEntries(keys.map((key) => [key, undefined]))),
    };
  }, [keys, written]);
}

const oneOf = (value: string | string[] | undefined) =>
  ((Array.isArray(value) ? value[0] : value) ?? '').replaceAll('\n', ' ');
