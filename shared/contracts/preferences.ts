/** What a person has chosen for themselves, in every workspace: display units, hints that need not be shown again. */
import { z } from 'zod';
import { CHOSEN_QUANTITIES, unitsOf, type ChosenQuantity } from '../display-units';

const symbolOf = (quantity: ChosenQuantity) =>
  z.enum(unitsOf(quantity).map(({ symbol }) => symbol) as [string, ...string[]]).optional();
const unitFields = Object.fromEntries(
  CHOSEN_QUANTITIES.map((quantity) => [quantity, symbolOf(quantity)]),
) as Record<ChosenQuantity, ReturnType<typeof symbolOf>>;

/** Hints of the first visit, one a screen. */
export const HINTS = ['recordings', 'bench', 'noise', 'sets'] as const;
export type Hint = (typeof HINTS)[number];

export const preferencesSchema = z.object({
  units: z
    .strictObject(unitFields)
    .default({})
    .describe('Symbol of the unit that each quantity is shown in; left out: the default. The API stays SI.'),
  hintsSeen: z.array(z.enum(HINTS)).default([]),
});
export type Preferences = z.infer<typeof preferencesSchema>;

/** PATCH /me/preferences: what is named is replaced as a whole. */
export const preferencesPatchSchema = z.strictObject({
  units: z.strictObject(unitFields).optional(),
  hintsSeen: z.array(z.enum(HINTS)).max(HINTS.length).optional(),
});
export type PreferencesPatch = z.infer<typeof preferencesPatchSchema>;
