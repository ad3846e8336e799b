import { randomBytes } from 'node:crypto';
import { chmodSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

const SHORTEST = 32;

/** The session secret kept in the data folder, made on the first start and readable by the owner alone. */
export function readOrCreateSecret(dataFolder: string): string {
  const path = join(dataFolder, 'session-secret');
  mkdirSync(dataFolder, { recursive: true, mode: 0o700 });
  try {
    const kept = readFileSync(path, 'utf8').trim();
    if (kept.length < SHORTEST) {
      throw new Error(`The secret in ${path} is too short. Delete the file, and a new one is made.`);
    }
    chmodSync(path, 0o600);
    return kept;
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'ENOENT') throw error;
  }
  const secret = randomBytes(48).toString('base64url');
  writeFileSync(path, `${secret}\n`, { mode: 0o600, flag: 'wx' });
  return secret;
}
