/** The sign-in page's address, with the way back. */
export function signInPath(from: string): string {
  return from === '/' || from === '' ? '/sign-in' : `/sign-in?next=${encodeURIComponent(from)}`;
}

/** Where to go after signing in: only ever a path of this site. */
export function nextPath(next: string | string[] | undefined): string {
  const path = Array.isArray(next) ? next[0] : next;
  if (!path || !/^\/(?![/\\])/.test(path) || path.startsWith('/sign-in')) return '/';
  return path;
}
