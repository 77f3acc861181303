/** Finer pieces of a zoomed stretch: kept by level and tile, cancelled when nobody waits for them. */
import { useQueries, useQueryClient, type QueryClient, type UseQueryResult } from '@tanstack/react-query';
import { useCallback, useEffect, useMemo } from 'react';
import type { Piece } from './splice';
import { isHeld, tilesOf, type Span, type Tile } from './tiles';

export interface TileSource<T> {
  /** Of the react-query cache: what it is of. */
  key: readonly string[];
  fetch: (tile: Tile, signal: AbortSignal) => Promise<T>;
  /** Whether nothing was left out of a piece, so that none finer has to be fetched within it. */
  isWhole: (data: T) => boolean;
}

export interface Tiles<T> {
  /** In order of time, not overlapping. */
  pieces: readonly Piece<T>[];
  fetching: boolean;
  error: Error | null;
}

const KEPT_MS = 120_000;

/** `view` is a stretch that stands still; null: the whole is looked at, and nothing finer is needed; `source` null: there is nothing to ask yet. */
export function useTiles<T>(source: TileSource<T> | null, view: Span | null, whole: Span): Tiles<T> {
  const client = useQueryClient();
  const [wholeFrom, wholeTo] = whole;
  const tiles = useMemo(
    () => (source && view ? tilesOf(view, [wholeFrom, wholeTo]) : []),
    [source, view, wholeFrom, wholeTo],
  );
  const kept = source ? keptPieces<T>(client, source.key) : [];
  const complete = kept.filter(({ data }) => source?.isWhole(data)).map(({ span }) => span);
  const asked = tiles.filter((tile) => !isHeld(tile, complete));
  const combine = useCallback(
    (results: UseQueryResult<T>[]): Tiles<T> => ({
      pieces: source ? tiles.flatMap((tile) => bestPiece<T>(client, source.key, tile)) : [],
      fetching: results.some((result) => result.isFetching),
      error: results.find((result) => result.isError)?.error ?? null,
    }),
    [client, source, tiles],
  );
  useDropWhenPast(client, source?.key);
  return useQueries({
    queries: asked.map((tile) => ({
      queryKey: [...(source?.key ?? []), tile],
      queryFn: ({ signal }: { signal: AbortSignal }) => source!.fetch(tile, signal),
      staleTime: Infinity,
      gcTime: KEPT_MS,
    })),
    combine,
  });
}

/** What is of a run that a newer one has taken the place of goes at once. */
function useDropWhenPast(client: QueryClient, key: readonly string[] | undefined): void {
  const text = key?.join('/');
  useEffect(() => {
    if (text === undefined) return;
    return () => client.removeQueries({ queryKey: text.split('/') });
  }, [client, text]);
}

/** All pieces of `key` that have arrived and are kept. */
function keptPieces<T>(client: QueryClient, key: readonly string[]): (Piece<T> & { level: number })[] {
  return client.getQueriesData<T>({ queryKey: key }).flatMap(([queryKey, data]) => {
    const tile = queryKey[queryKey.length - 1] as Tile;
    return data === undefined ? [] : [{ span: [tile.fromS, tile.toS] as const, level: tile.level, data }];
  });
}

/** The finest kept piece that holds `tile`, for the tile's own stretch. */
function bestPiece<T>(client: QueryClient, key: readonly string[], tile: Tile): Piece<T>[] {
  const [best] = keptPieces<T>(client, key)
    .filter(({ span }) => isHeld(tile, [span]))
    .sort((a, b) => b.level - a.level);
  return best ? [{ span: [tile.fromS, tile.toS], data: best.data }] : [];
}
