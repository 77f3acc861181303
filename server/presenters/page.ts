import type { Page } from '@/shared/contracts/common';

/** A page of rows as a page of what the API shows of each. */
export const presentPage = <R, T>({ items, nextCursor }: Page<R>, present: (row: R) => T): Page<T> => ({
  items: items.map(present),
  nextCursor,
});
