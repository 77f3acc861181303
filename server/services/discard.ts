/** Removing what a cancelled or deleted piece of work has stored. */
import type { JobContext } from '../context';

/** A worker that was told to stop may still be finishing a write, ms. */
const SETTLE_MS = 3_000;

/** Removes every key under `prefix`, and once more a moment later. */
export async function discardFiles(ctx: JobContext, prefix: string): Promise<void> {
  await ctx.store.removePrefix(prefix);
  const again = setTimeout(() => {
    ctx.store.removePrefix(prefix).catch((error: unknown) => ctx.log.warn({ err: error, prefix }, 'discard'));
  }, SETTLE_MS);
  again.unref();
}

/** Removes what rows that are gone have left in the store. May be repeated: a kill in between leaves the rest for later. */
export async function finishDiscards(ctx: JobContext): Promise<void> {
  for (const row of await ctx.db.Discard.findAll()) {
    await discardFiles(ctx, row.prefix);
    await row.destroy();
  }
}
