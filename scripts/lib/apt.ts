/** Debian packages, installed on demand where that is possible without asking anybody. */
import { existsSync } from 'node:fs';
import { isRoot, run } from './shell';

const APT_LIMIT_MS = 600_000;

/** Words that must come before `apt-get`: none for root, sudo where it asks no password, undefined where neither holds. */
function privilege(): string[] | undefined {
  if (!existsSync('/usr/bin/apt-get')) return undefined;
  if (isRoot()) return [];
  return run('sudo', ['-n', 'true']).ok ? ['sudo', '-n'] : undefined;
}

/**
 * Installs `packageName` with apt-get. Throws an Error with what to do by hand when that is not possible:
 * `otherwise` says what else would help.
 */
export function aptInstall(packageName: string, otherwise: string, log: (line: string) => void): void {
  const byHand = `Install it (Debian, Ubuntu: sudo apt-get install -y ${packageName})${otherwise}.`;
  const before = privilege();
  if (!before) {
    throw new Error(
      `${packageName} is not installed, and this account may not install it (neither root nor sudo). ${byHand}`,
    );
  }
  log(`Installing Debian's package ${packageName} …`);
  const install = ['install', '-y', '-qq', '--no-install-recommends', packageName];
  for (const args of [['update', '-qq'], install]) {
    const words = [...before, 'env', 'DEBIAN_FRONTEND=noninteractive', 'apt-get', ...args];
    const result = run(words[0]!, words.slice(1), { timeout: APT_LIMIT_MS });
    if (!result.ok) {
      const reason = result.stderr.trim().split('\n').slice(-3).join('\n');
      throw new Error(`"apt-get ${args.join(' ')}" failed: ${reason}\n${byHand}`);
    }
  }
}
