/** Debian's gcc, installed where it is missing. */
import { aptInstall } from '../../scripts/lib/apt';
import { run } from '../../scripts/lib/shell';

/** Throws with what to do by hand where it can be neither found nor installed. */
export function needGcc(): void {
  if (run('gcc', ['--version']).ok && run('gcc', ['-include', 'stdio.h', '-E', '-x', 'c', '/dev/null']).ok)
    return;
  for (const name of ['gcc', 'libc6-dev']) aptInstall(name, '', console.log);
}

/** Compiles `source` as strict C99, without a warning, and runs it; answers what it printed. */
export function compileAndRun(source: string, program: string): string {
  const compiled = run('gcc', [
    '-std=c99',
    '-Wall',
    '-Wextra',
    '-pedantic',
    '-Werror',
    source,
    '-o',
    program,
  ]);
  if (!compiled.ok) throw new Error(compiled.stderr);
  const done = run(program, []);
  if (!done.ok) throw new Error(done.stderr);
  return done.stdout;
}
