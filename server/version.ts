/** As package.json says (a test holds them together). */
export const VERSION = '0.1.0';
