/** Opens the store that a configuration names; server and worker processes open the same one. */
import { FolderStore } from './folder';
import type { Store, StoreConfig } from './types';

export function openStore(config: StoreConfig): Store {
  return new FolderStore(config.root);
}

/** Clears away what interrupted writes of dead processes left in a folder store; `pid`: of that process only. */
export async function sweepStore(config: StoreConfig, pid?: number): Promise<void> {
  await new FolderStore(config.root).sweep(pid);
}
