/** Keys of the store: relative paths with '/', of harmless characters only, so that no key can leave the store. */

const SEGMENT = /^[A-Za-z0-9_-][A-Za-z0-9._-]{0,199}$/;
const MAX_KEY_LENGTH = 900;

/** Throws where `key` is not a plain relative path ('..', leading '/', '\', control characters, hidden files …). */
export function assertStoreKey(key: string): void {
  if (key.length > MAX_KEY_LENGTH || !key.split('/').every((segment) => SEGMENT.test(segment)))
    throw new Error(`Not a key of the store: ${JSON.stringify(key.slice(0, 120))}.`);
}

/** Like assertStoreKey for a prefix, which may end with '/'. The empty prefix is refused: it would mean everything. */
export function assertStorePrefix(prefix: string): void {
  assertStoreKey(prefix.endsWith('/') ? prefix.slice(0, -1) : prefix);
}

/** A file name that any store and any file system takes: what else is in `name` becomes '-'. */
export function safeFileName(name: string): string {
  const plain = name
    .normalize('NFKD')
    .replace(/[^A-Za-z0-9._-]+/g, '-')
    .replace(/^[.-]+|[.-]+$/g, '');
  return plain.slice(0, 120) || 'file';
}
