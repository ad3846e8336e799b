import { createHash, randomBytes } from 'node:crypto';

/** Name of a record in addresses: random, so that none can be guessed from another. */
export function makeId(): string {
  return randomBytes(12).toString('base64url');
}

/** A secret that opens something by being known: mailed links and share links. */
export function makeToken(): string {
  return randomBytes(32).toString('base64url');
}

/** What is kept of a token. Tokens are long and random, so a fast hash is enough. */
export function hashToken(token: string): string {
  return createHash('sha256').update(token).digest('base64url');
}
