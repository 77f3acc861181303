/** Where PostgreSQL's programs are. */
import { existsSync, readdirSync, realpathSync } from 'node:fs';
import path from 'node:path';
import { run } from '../lib/shell';

const DEBIAN_ROOT = '/usr/lib/postgresql';
const NEEDED = ['initdb', 'postgres', 'psql', 'pg_isready'];

/** A folder with all needed programs, of major version `major` if given; the newest of Debian's first. */
export function findPostgres(major?: string): string | undefined {
  const folders = candidates().filter((folder) =>
    NEEDED.every((program) => existsSync(path.join(folder, program))),
  );
  return major ? folders.find((folder) => majorOf(folder) === major) : folders[0];
}

function candidates(): string[] {
  const versions = existsSync(DEBIAN_ROOT) ? readdirSync(DEBIAN_ROOT) : [];
  const debian = versions
    .sort((a, b) => Number(b) - Number(a))
    .map((version) => path.join(DEBIAN_ROOT, version, 'bin'));
  const onPath = (process.env.PATH ?? '')
    .split(':')
    .map((folder) => path.join(folder, 'postgres'))
    .filter((program) => existsSync(program))
    .map((program) => path.dirname(realpathSync(program)));
  return [...debian, ...onPath];
}

const majorOf = (folder: string) => run(path.join(folder, 'postgres'), ['-V']).stdout.match(/\) (\d+)/)?.[1];
