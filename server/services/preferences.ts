/** A person's own choices. They concern nobody else, so they are no matter of the audit trail. */
import { preferencesSchema, type Preferences, type PreferencesPatch } from '@/shared/contracts/preferences';
import type { Context, Person } from '../context';

/** Replaces what the patch names; answers all of them. */
export async function changePreferences(
  ctx: Context,
  person: Person,
  patch: PreferencesPatch,
): Promise<Preferences> {
  return ctx.db.transaction(async (transaction) => {
    const user = await ctx.db.User.findByPk(person.userId, {
      lock: transaction.LOCK.UPDATE,
      transaction,
      rejectOnEmpty: true,
    });
    const preferences = { ...readPreferences(user.preferences), ...patch };
    await user.update({ preferences }, { transaction });
    return preferences;
  });
}

/** What is kept, with defaults filled in; choices that this version does not know any more count as not made. */
export function readPreferences(kept: unknown): Preferences {
  const read = preferencesSchema.safeParse(kept ?? {});
  return read.success ? read.data : preferencesSchema.parse({});
}
