/** What an object storage answered when it did not do as asked, in plain words. */
import { StoreFailed, StoreKeyMissing } from './types';

export type Doing = 'read' | 'write' | 'remove';

/** Errors of the SDK and of the system below it, told by form: the SDK's classes are loaded only where it is used. */
interface Refusal {
  name?: string;
  code?: string;
  message?: string;
  $metadata?: { httpStatusCode?: number };
}

const UNREACHABLE =
  /\b(ECONNREFUSED|ECONNRESET|EPIPE|ETIMEDOUT|ENOTFOUND|EAI_AGAIN|EHOSTUNREACH|ENETUNREACH|TimeoutError)\b/;
/** Names that servers give a quota that is used up. */
const FULL = /quota|storagefull|insufficientstorage|nospace/i;
const REASONS: Record<string, string> = {
  NoSuchBucket: 'there is no such bucket. Make it, or correct STORE_URL.',
  AccessDenied:
    'these credentials may not do that in this bucket. Allow listing, reading, writing and deleting.',
  InvalidAccessKeyId: 'the access key is not known. Correct AWS_ACCESS_KEY_ID.',
  SignatureDoesNotMatch: 'the secret key does not fit the access key. Correct AWS_SECRET_ACCESS_KEY.',
  ExpiredToken: 'the credentials have expired. Renew them.',
  CredentialsProviderError: 'there are no credentials. Set AWS_ACCESS_KEY_ID and AWS_SECRET_ACCESS_KEY.',
  PermanentRedirect: 'the bucket lies in another region. Correct AWS_REGION.',
  AuthorizationHeaderMalformed: 'the bucket lies in another region. Correct AWS_REGION.',
};
const BY_STATUS: Record<number, string> = {
  401: 'AccessDenied',
  403: 'AccessDenied',
  301: 'PermanentRedirect',
};

/** Whether the answer was that nothing is stored under the key. A missing bucket is another matter. */
export const isMissing = (error: unknown): boolean =>
  ['NoSuchKey', 'NotFound'].includes((error as Refusal | null)?.name ?? '');

/** StoreKeyMissing where `key` is not there, StoreFailed where the storage refused or was away; anything else unchanged. */
export function s3Failure(error: unknown, doing: Doing, key?: string): unknown {
  if (key !== undefined && isMissing(error)) return new StoreKeyMissing(key);
  const { name = '', code = '', message = '', $metadata } = (error ?? {}) as Refusal;
  const status = $metadata?.httpStatusCode;
  const failed = (as: string, reason: string) =>
    new StoreFailed(as, `The object storage could not ${doing} a file: ${reason}`, { cause: error });
  if (FULL.test(name) || FULL.test(code) || status === 507)
    return failed('ENOSPC', 'it is full. Free some space or raise the quota, then try again.');
  const isAway =
    status === undefined ? UNREACHABLE.test(`${name} ${code} ${message}`) : status >= 500 || status === 429;
  if (isAway) return failed('store-unreachable', 'it does not answer just now. Try again in a moment.');
  const known = name in REASONS ? name : BY_STATUS[status ?? 0];
  const reason = known === undefined ? undefined : REASONS[known];
  if (reason !== undefined) return failed('store-refused', reason);
  return status === undefined ? error : failed('store-refused', `it answered “${name}” (HTTP ${status}).`);
}
