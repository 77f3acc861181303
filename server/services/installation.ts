/** What the sign-in page must know. */
import { DEMO_PASSWORD, DEMO_PEOPLE } from '@/fixtures/demo-scenario';
import type { Installation } from '@/shared/contracts/accounts';
import type { Context } from '../context';
import { needsFirstAdmin } from './accounts';

/** What anybody may know before sign-in. The demo people's password is no secret: it is printed at start, too. */
export async function describeInstallation(ctx: Context): Promise<Installation> {
  const demo = ctx.config.demo && (await ctx.db.Workspace.count({ where: { demo: true } })) > 0;
  const people = DEMO_PEOPLE.map(({ email, name, role }) => ({ email, name, role, password: DEMO_PASSWORD }));
  return {
    needsFirstAdmin: await needsFirstAdmin(ctx),
    demo,
    demoPeople: demo ? people : [],
    mailSink: ctx.config.smtpUrl === null,
  };
}
