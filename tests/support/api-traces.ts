/** What an upload may have left behind: rows, keys of the store, temporary files. */
import fs from 'node:fs';
import path from 'node:path';
import type { Api } from './api';

export interface Traces {
  recordings: number;
  files: number;
  runs: number;
  storeKeys: string[];
  temporary: string[];
}

export async function tracesOf({ ctx, dataDir }: Api): Promise<Traces> {
  const [recordings, files, runs] = await Promise.all([
    ctx.db.Recording.count(),
    ctx.db.RecordingFile.count(),
    ctx.db.Run.count(),
  ]);
  return {
    recordings,
    files,
    runs,
    storeKeys: filesBelow(path.join(dataDir, 'store')),
    temporary: filesBelow(path.join(dataDir, 'uploads')),
  };
}

export const NOTHING: Traces = { recordings: 0, files: 0, runs: 0, storeKeys: [], temporary: [] };

/** Relative paths of all files, sorted. */
export function filesBelow(folder: string): string[] {
  if (!fs.existsSync(folder)) return [];
  const entries = fs.readdirSync(folder, { recursive: true, withFileTypes: true });
  return entries
    .filter((entry) => entry.isFile())
    .map((entry) => path.relative(folder, path.join(entry.parentPath, entry.name)))
    .sort();
}
