/** A letter's text cut at its links; `path` is the link's path on this site. */
export function splitLinks(text: string): { text: string; path: string | null }[] {
  return text
    .split(/(https?:\/\/[^\s<>"]+)/)
    .filter((part) => part !== '')
    .map((part) => ({ text: part, path: /^https?:/.test(part) ? pathOf(part) : null }));
}

function pathOf(link: string): string | null {
  try {
    const url = new URL(link);
    return url.pathname + url.search;
  } catch {
    return null;
  }
}
