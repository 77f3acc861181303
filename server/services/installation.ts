import type { Installation } from '@/shared/contracts/accounts';
import type { Context } from '../context';
import { needsFirstAdmin } from './accounts';

/** What anybody may know before sign-in. The demo people's passwords are printed at start and shown here on purpose. */
export async function describeInstallation(ctx: Context): Promise<Installation> {
  const demo = await ctx.db.Workspace.findOne({ where: { demo: true } });
  return {
    needsFirstAdmin: await needsFirstAdmin(ctx),
    demo: demo !== null,
    demoPeople: [],
    mailSink: ctx.config.smtpUrl === null,
  };
}
