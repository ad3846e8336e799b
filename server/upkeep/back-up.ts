import { chmodSync, existsSync } from 'node:fs';

import sqlite3 from 'sqlite3';

import { SqliteFile } from './sqlite-file';

/** An upkeep command that cannot be done, in words for the one who gave it. */
export class UpkeepRefusal extends Error {}

/** Writes the database as it is at this moment into a new file, while the server may run and write. */
export async function backUp(databasePath: string, target: string): Promise<void> {
  if (!existsSync(databasePath)) {
    throw new UpkeepRefusal(`There is no database at ${databasePath}. Set DATA_DIR to the server's folder.`);
  }
  if (existsSync(target)) {
    throw new UpkeepRefusal(`${target} exists already and was left as it is. Name a new file.`);
  }
  const source = await SqliteFile.open(databasePath, sqlite3.OPEN_READWRITE);
  try {
    await source.all('PRAGMA busy_timeout = 10000');
    await source.all('VACUUM INTO ?', [target]);
    // It holds addresses and password hashes.
    chmodSync(target, 0o600);
  } finally {
    await source.close();
  }
}
