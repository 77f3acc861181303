/** Keeps the address of the page and the last bench in step with what is set. */
import { useRouter } from 'expo-router';
import { useEffect } from 'react';
import { useSession } from '@/hooks/session';
import { benchHref, benchQuery, type BenchLink } from './bench-link';
import { rememberBench } from './last-bench';
import { differences } from '@/shared/parameters/parameter-path';
import type { Bench } from './use-bench';

/** The address follows this long after the last change, ms: a drag writes it once. */
const DELAY_MS = 400;

/** Queries that a bench wrote itself, so that its page does not take them for a new link. */
export class OwnQueries {
  private last = '';
  wrote(query: string): void {
    this.last = query;
  }
  isOwn(query: string): boolean {
    return query === this.last;
  }
}

/** One text for equal queries, whatever their order. */
export const queryKey = (query: Record<string, string | undefined>): string =>
  JSON.stringify(
    Object.entries(query)
      .filter(([, value]) => value !== undefined && value !== '')
      .sort(([a], [b]) => (a < b ? -1 : 1)),
  );

export function useBenchAddress(bench: Bench, view: string, own: OwnQueries): void {
  const router = useRouter();
  const { id: workspaceId } = useSession().workspace;
  const { start, config, baseline, locked } = bench;
  useEffect(() => {
    if (locked !== null) return;
    const timer = setTimeout(() => {
      const link: BenchLink = {
        recordingId: start.recording.id,
        setId: start.set?.id,
        version: start.set?.version.number,
        changes: differences(start.from, config.parameters),
        windows: config.outages.length > 0 || start.set ? config.outages : undefined,
        baselineRunId: baseline.runId ?? undefined,
        options: config.options,
        view: view === 'overview' ? undefined : view,
      };
      const query = benchQuery(link);
      own.wrote(queryKey(query));
      router.setParams(query);
      rememberBench(workspaceId, benchHref(link));
    }, DELAY_MS);
    return () => clearTimeout(timer);
  }, [router, workspaceId, start, config, baseline, view, locked, own]);
}
