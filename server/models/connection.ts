import { Sequelize } from 'sequelize';
import sqlite3 from 'sqlite3';

/** Name under which Sequelize keeps the connection of changes. */
const WRITER = 'writer';

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

/** The part of Sequelize's connection manager that decides which connection serves what. */
interface ConnectionManager {
  readonly connections: Record<string, sqlite3.Database | undefined>;
  getConnection(options?: { uuid?: string }): Promise<sqlite3.Database>;
  releaseConnection(connection: sqlite3.Database): void;
}

const managerOf = (sequelize: Sequelize) =>
  (sequelize as unknown as { connectionManager: ConnectionManager }).connectionManager;

/**
 * Sequelize opens a connection for each transaction, and opening reads the whole schema. Changes come one after
 * another, so that one connection, kept open, serves them all.
 */
function keepOneWriter(sequelize: Sequelize): void {
  const manager = managerOf(sequelize);
  const connect = manager.getConnection.bind(manager);
  // What is outside a transaction asks without a name.
  manager.getConnection = (options = {}) =>
    connect(options.uuid === undefined ? options : { ...options, uuid: WRITER });
  manager.releaseConnection = () => undefined;
}

/** Closes the connection of changes, so that nothing of one that failed reaches the next. */
export async function replaceWriter(sequelize: Sequelize): Promise<void> {
  const { connections } = managerOf(sequelize);
  const writer = connections[WRITER];
  delete connections[WRITER];
  if (writer) await new Promise<void>((resolve) => writer.close(() => resolve()));
}

/** Connects to the SQLite file at `path`; no schema is touched. */
export function connectSqlite(path: string): Sequelize {
  const sequelize = new Sequelize({
    dialect: 'sqlite',
    storage: path,
    dialectModule: { ...sqlite3, Database: openConnection },
    logging: false,
  });
  keepOneWriter(sequelize);
  return sequelize;
}
