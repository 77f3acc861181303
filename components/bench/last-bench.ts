/** The bench that was open last, kept in the browser a workspace. */
const PREFIX = '/bench/';
const KEY = 'driftwright.lastBench';

/** Address of the last bench of `workspaceId`, or null. */
export function lastBench(workspaceId: string): `/bench/${string}` | null {
  try {
    const href = globalThis.localStorage?.getItem(`${KEY}.${workspaceId}`) ?? null;
    return href?.startsWith(PREFIX) ? `${PREFIX}${href.slice(PREFIX.length)}` : null;
  } catch {
    return null; // storage may be forbidden
  }
}

export function rememberBench(workspaceId: string, href: string | null): void {
  try {
    if (href === null) globalThis.localStorage?.removeItem(`${KEY}.${workspaceId}`);
    else globalThis.localStorage?.setItem(`${KEY}.${workspaceId}`, href);
  } catch {
    // storage may be forbidden: the Bench tab then asks for a recording
  }
}
