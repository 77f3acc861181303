/** Passwords and single-use tokens. */
import { createHash, randomBytes } from 'node:crypto';
import argon2 from 'argon2';

/** argon2id with the memory, passes and lanes that OWASP's password storage guidance gives as its first choice. */
const ARGON = { type: argon2.argon2id, memoryCost: 19_456, timeCost: 2, parallelism: 1 } as const;

export const hashPassword = (password: string): Promise<string> => argon2.hash(password, ARGON);

let decoy: Promise<string> | undefined;

/** Takes as long for an address that nobody has (`hash` undefined) as for a wrong password. */
export async function checkPassword(hash: string | undefined, password: string): Promise<boolean> {
  decoy ??= hashPassword(randomBytes(16).toString('hex'));
  const fits = await argon2.verify(hash ?? (await decoy), password);
  return hash !== undefined && fits;
}

/** A fresh token for a letter; only its hash is stored. */
export function newToken(): { token: string; hash: string } {
  const token = randomBytes(32).toString('base64url');
  return { token, hash: hashToken(token) };
}

export const hashToken = (token: string): string => createHash('sha256').update(token).digest('hex');
