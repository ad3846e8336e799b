import { Sequelize } from 'sequelize';
import sqlite3 from 'sqlite3';

/**
 * Every connection waits for locks, syncs at each commit (so that what was acknowledged outlives a loss of power) and keeps references
 * whole. Sequelize offers no hook on new SQLite connections, and opens one for each transaction, so the
 * statements ride on opening itself: `exec` is exclusive and goes first.
 */
const PRAGMAS = [
  'PRAGMA busy_timeout = 5000',
  'PRAGMA journal_mode = WAL',
  'PRAGMA synchronous = FULL',
  'PRAGMA foreign_keys = ON',
].join(';');

function openConnection(
  this: unknown,
  path: string,
  mode: number,
  done: (error: Error | null) => void,
): sqlite3.Database {
  const connection = new sqlite3.Database(path, mode, (openError) => {
    if (openError !== null) done(openError);
  });
  connection.exec(PRAGMAS, done);
  return connection;
}

/** Connects to the SQLite file at `path`; no schema is touched. */
export function connectSqlite(path: string): Sequelize {
  return new Sequelize({
    dialect: 'sqlite',
    storage: path,
    dialectModule: { ...sqlite3, Database: openConnection },
    logging: false,
  });
}
