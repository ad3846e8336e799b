import { chmodSync, copyFileSync, existsSync, renameSync, rmSync } from 'node:fs';

import sqlite3 from 'sqlite3';

import { MIGRATIONS } from '../migrations';
import { UpkeepRefusal } from './back-up';
import { SqliteFile } from './sqlite-file';

async function checkBackup(path: string): Promise<void> {
  const file = await SqliteFile.open(path, sqlite3.OPEN_READONLY);
  try {
    const answers = await file.all<{ integrity_check: string }>('PRAGMA integrity_check');
    if (answers[0]?.integrity_check !== 'ok') throw new Error('damaged');
    const steps = await file.all<{ name: string }>('SELECT name FROM schema_migrations');
    const known = new Set(MIGRATIONS.map(({ name }) => name));
    const unknown = steps.filter(({ name }) => !known.has(name));
    if (steps.length === 0 || unknown.length > 0) {
      throw new UpkeepRefusal(
        `${path} is of another version of Moiety (${unknown.map(({ name }) => name).join(', ') || 'no schema'}). Restore it with that version.`,
      );
    }
  } catch (error) {
    if (error instanceof UpkeepRefusal) throw error;
    throw new UpkeepRefusal(`${path} is no sound backup of Moiety. Nothing was changed; try an older one.`);
  } finally {
    await file.close();
  }
}

/** Refuses while a server has the file open: leaving the write-ahead log needs the file to oneself. */
async function takeAlone(path: string): Promise<void> {
  const file = await SqliteFile.open(path, sqlite3.OPEN_READWRITE);
  try {
    await file.all('PRAGMA journal_mode = DELETE');
  } catch (error) {
    if (!String(error).includes('SQLITE_BUSY')) throw error;
    throw new UpkeepRefusal('The server is running on this database. Stop it, then restore.');
  } finally {
    await file.close();
  }
}

/** Puts a backup in the database's place; the old file stays beside it under the returned name. */
export async function restore(databasePath: string, backup: string): Promise<string | null> {
  if (!existsSync(backup)) throw new UpkeepRefusal(`There is no file ${backup}. Check the name.`);
  await checkBackup(backup);
  const incoming = `${databasePath}.incoming`;
  rmSync(incoming, { force: true });
  if (!existsSync(databasePath)) {
    copyFileSync(backup, databasePath);
    chmodSync(databasePath, 0o600);
    return null;
  }
  await takeAlone(databasePath);
  copyFileSync(backup, incoming);
  chmodSync(incoming, 0o600);
  const aside = `${databasePath}.before-${new Date().toISOString().replaceAll(':', '-')}`;
  renameSync(databasePath, aside);
  renameSync(incoming, databasePath);
  return aside;
}
