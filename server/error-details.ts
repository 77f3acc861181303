/** What an unknown error says of itself. Told by form, not by class: classes differ between realms. */

/** The code that errors of the system and of drivers carry. */
export const codeOf = (error: unknown): string | null =>
  typeof error === 'object' && error !== null && 'code' in error && typeof error.code === 'string'
    ? error.code
    : null;

export const messageOf = (error: unknown): string =>
  typeof error === 'object' && error !== null && 'message' in error ? String(error.message) : String(error);
