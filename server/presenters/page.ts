import type { Page } from '@/shared/contracts/common';

/** A list that is never long enough for pages, in the form of one. */
export const presentWhole = <R, T>(rows: readonly R[], present: (row: R) => T): Page<T> => ({
  items: rows.map(present),
  nextCursor: null,
});

/** A page of rows as a page of what the API shows of each. */
export const presentPage = <R, T>({ items, nextCursor }: Page<R>, present: (row: R) => T): Page<T> => ({
  items: items.map(present),
  nextCursor,
});
