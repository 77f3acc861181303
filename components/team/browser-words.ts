/** "Firefox on Linux" out of what a browser says of itself (RFC 9110, User-Agent). Pure. */
export function browserWords(agent: string | null): string {
  if (!agent) return 'Unknown browser';
  const browser = BROWSERS.find(([sign]) => agent.includes(sign))?.[1] ?? 'Browser';
  const system = SYSTEMS.find(([sign]) => agent.includes(sign))?.[1];
  return system ? `${browser} on ${system}` : browser;
}

/** The more special first: each names the next in its own string as well. */
const BROWSERS = [
  ['Edg/', 'Edge'],
  ['OPR/', 'Opera'],
  ['Firefox/', 'Firefox'],
  ['Chrome/', 'Chrome'],
  ['Safari/', 'Safari'],
] as const;
const SYSTEMS = [
  ['Android', 'Android'],
  ['iPhone', 'iPhone'],
  ['iPad', 'iPad'],
  ['Windows', 'Windows'],
  ['Mac OS X', 'macOS'],
  ['Linux', 'Linux'],
] as const;
