/** Whether a build is stale: a hash over the content of everything that goes into it. */
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { BUILD, inRoot } from '../lib/project';

export type BuildPart = 'client' | 'server';
type Stamps = Partial<Record<BuildPart, string>>;

/** Hex SHA-256 over the names and contents of files and folders, given relative to the project's root. */
export function hashInputs(inputs: readonly string[]): string {
  const hash = createHash('sha256');
  for (const file of inputs.flatMap(filesUnder)) {
    hash
      .update(`${file}\0`)
      .update(readFileSync(inRoot(file)))
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

function filesUnder(input: string): string[] {
  if (!existsSync(inRoot(input))) return [];
  if (!statSync(inRoot(input)).isDirectory()) return [input];
  return readdirSync(inRoot(input))
    .sort()
    .flatMap((name) => filesUnder(path.join(input, name)));
}
