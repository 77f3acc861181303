/** Whether a build is stale: a hash over the content of everything that goes into it. */
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { BUILD, ROOT } from '../lib/project';

export type BuildPart = 'client' | 'server';
type Stamps = Partial<Record<BuildPart, string>>;

/** Hex SHA-256 over the names and contents of files and folders, given relative to `root`; what is missing counts as empty. */
export function hashInputs(inputs: readonly string[], root: string = ROOT): string {
  const hash = createHash('sha256');
  for (const file of inputs.flatMap((input) => filesUnder(root, input))) {
    hash
      .update(`${file}\0`)
      .update(readFileSync(path.join(root, file)))
      .update('\0');
  }
  return hash.digest('hex');
}

export const isStamped = (part: BuildPart, hash: string): boolean => readStamps()[part] === hash;

export function writeStamp(part: BuildPart, hash: string | undefined): void {
  mkdirSync(path.dirname(BUILD.stamp), { recursive: true });
  writeFileSync(BUILD.stamp, JSON.stringify({ ...readStamps(), [part]: hash }));
}

function readStamps(): Stamps {
  if (!existsSync(BUILD.stamp)) return {};
  try {
    return JSON.parse(readFileSync(BUILD.stamp, 'utf8')) as Stamps;
  } catch {
    return {}; // cut short by a kill: build again
  }
}

function filesUnder(root: string, input: string): string[] {
  const place = path.join(root, input);
  if (!existsSync(place)) return [];
  if (!statSync(place).isDirectory()) return [input];
  return readdirSync(place)
    .sort()
    .flatMap((name) => filesUnder(root, path.join(input, name)));
}
