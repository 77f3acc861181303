/** What the server may use of the workers: the pool with its messages, and the store. */
export * from './protocol';
export { createPool, WorkerPool, type PoolOptions } from './pool';
export type { PoolLog } from './worker-process';
export { checkStore, openStore, sweepStore } from './store/open';
export { safeFileName } from './store/keys';
export { storeKeys, StoreFailed, StoreKeyMissing, type Store, type StoreConfig } from './store/types';
export { sha256OfJson } from './jobs/hashes';
export { ENGINE_VERSION } from './engine/types';
