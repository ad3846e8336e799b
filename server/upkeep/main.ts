import { join } from 'node:path';

import { readEnvironment } from '../env';
import { backUp } from './back-up';
import { restore } from './restore';

/** `backup <file>` or `restore <file>`, on the database in DATA_DIR. */
async function run(command: string | undefined, file: string | undefined): Promise<string> {
  const database = join(readEnvironment(process.env).dataFolder, 'moiety.sqlite');
  if (file === undefined || (command !== 'backup' && command !== 'restore'))
    throw new Error('Name a file: npm run backup -- <file>, or npm run restore -- <file>.');
  if (command === 'backup') {
    await backUp(database, file);
    return `Backed up to ${file}.`;
  }
  const aside = await restore(database, file);
  return `Restored from ${file}.${aside === null ? '' : ` The database before it is kept as ${aside}.`}`;
}

try {
  process.stdout.write(`${await run(process.argv[2], process.argv[3])}\n`);
} catch (error) {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 1;
}
