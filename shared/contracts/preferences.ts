/** What a person has chosen for themselves, in every workspace: display units, letters, hints that need not be shown again. */
import { z } from 'zod';
import { CHOSEN_QUANTITIES, unitsOf, type ChosenQuantity } from '../display-units';

const symbolOf = (quantity: ChosenQuantity) =>
  z.enum(unitsOf(quantity).map(({ symbol }) => symbol) as [string, ...string[]]).optional();
const unitFields = Object.fromEntries(
  CHOSEN_QUANTITIES.map((quantity) => [quantity, symbolOf(quantity)]),
) as Record<ChosenQuantity, ReturnType<typeof symbolOf>>;

/** Letters that a person may do without. Invitations and password resets always go. */
export const LETTERS = ['reviewAsked', 'returned', 'released', 'anyReleased', 'verificationFailed'] as const;
export type LetterKind = (typeof LETTERS)[number];

/** Who has not chosen gets what concerns their own work or asks for it. */
const USUAL_LETTERS: Record<LetterKind, boolean> = {
  reviewAsked: true,
  returned: true,
  released: true,
  anyReleased: false,
  verificationFailed: true,
};

const letterFields = z
  .strictObject({
    reviewAsked: z.boolean().describe('A version waits for a review that one may give. Usually on.'),
    returned: z.boolean().describe('A version that one wrote or submitted was returned. Usually on.'),
    released: z.boolean().describe('A version that one wrote or submitted was released. Usually on.'),
    anyReleased: z.boolean().describe('Any version of the workspace was released. Usually off.'),
    verificationFailed: z
      .boolean()
      .describe('A verification that one started ended with cells that fail. Usually on.'),
  })
  .partial();

/** Hints of the first visit, one a screen. */
export const HINTS = ['recordings', 'bench', 'noise', 'sets'] as const;
export type Hint = (typeof HINTS)[number];

export const preferencesSchema = z.object({
  units: z
    .strictObject(unitFields)
    .default({})
    .describe('Symbol of the unit that each quantity is shown in; left out: the default. The API stays SI.'),
  letters: letterFields.default({}).describe('Letters wanted (true) or not; left out: the usual.'),
  hintsSeen: z.array(z.enum(HINTS)).default([]),
});
export type Preferences = z.infer<typeof preferencesSchema>;

/** PATCH /me/preferences: what is named is replaced as a whole. */
export const preferencesPatchSchema = z.strictObject({
  units: z.strictObject(unitFields).optional(),
  letters: letterFields.optional(),
  hintsSeen: z.array(z.enum(HINTS)).max(HINTS.length).optional(),
});
export type PreferencesPatch = z.infer<typeof preferencesPatchSchema>;

/** Whether the person wants letters of this kind. */
export const wantsLetter = ({ letters }: Preferences, kind: LetterKind): boolean =>
  letters[kind] ?? USUAL_LETTERS[kind];
