/** What stands in the terminal when all is up. */
import { installationSchema } from '@/shared/contracts/accounts';

/** Prints where Driftwright is, and who can sign in. */
export async function announce(address: string, seconds: number, logFile: string): Promise<void> {
  const answer = await fetch(`${address}/api/v1/installation`);
  const installation = installationSchema.parse(await answer.json());
  const lines = [`Driftwright is ready after ${seconds.toFixed(1)} s.`, '', `  ${address}`, ''];
  if (installation.needsFirstAdmin)
    lines.push('  Nobody has an account yet: the page makes the first one.', '');
  if (installation.demo) {
    const people = installation.demoPeople.map(
      ({ role, email, password }) => `    ${role.padEnd(9)} ${email.padEnd(34)} ${password}`,
    );
    lines.push('  Demo sign-ins', ...people, '');
  }
  console.log([...lines, `  Log: ${logFile}`, '  Ctrl-C stops it.'].join('\n'));
}
