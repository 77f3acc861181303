/** Opens the store that a configuration names; server and worker processes open the same one. */
import { FolderStore } from './folder';
import { S3Store } from './s3';
import type { Store, StoreConfig } from './types';

export function openStore(config: StoreConfig): Store {
  return config.kind === 'folder' ? new FolderStore(config.root) : new S3Store(config);
}

/** Asks the object storage something simple. Throws StoreFailed where it is away or refuses; a folder is made by its first file. */
export async function checkStore(config: StoreConfig): Promise<void> {
  if (config.kind === 's3') await openStore(config).list('recordings/none/');
}

/**
 * Clears away what interrupted writes of dead processes left in a folder store; `pid`: of that process only. Object
 * storage shows nothing of a put that was cut off, and drops its parts by the bucket's own rule.
 */
export async function sweepStore(config: StoreConfig, pid?: number): Promise<void> {
  if (config.kind === 'folder') await new FolderStore(config.root).sweep(pid);
}
