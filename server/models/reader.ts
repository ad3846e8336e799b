import sqlite3 from 'sqlite3';

/** Connections that read beside each other: fewer than the threads for such work, so that a change never waits for all of them. */
const CONNECTIONS = 2;
/** Pages kept by each connection, in kibibytes. */
const CACHE = 32_768;
const PRAGMAS = `PRAGMA busy_timeout = 5000; PRAGMA query_only = ON; PRAGMA cache_size = -${CACHE}`;

/** Values by the names that stand behind `$` in the text; a list goes in as JSON and comes out by `json_each`. */
export type ReadValues = Readonly<Record<string, string | number | null>>;

/** A connection that reads one statement at a time, each prepared once: the texts are constants of the code. */
class ReadConnection {
  private readonly database: sqlite3.Database;
  readonly statements = new Map<string, Promise<sqlite3.Statement>>();

  constructor(path: string) {
    this.database = new sqlite3.Database(path, sqlite3.OPEN_READWRITE);
    this.database.exec(PRAGMAS);
  }

  async all<Row>(text: string, values: ReadValues): Promise<Row[]> {
    const statement = await this.statement(text);
    const named: Record<string, string | number | null> = {};
    for (const name in values) named[`$${name}`] = values[name] ?? null;
    return new Promise((resolve, reject) => {
      statement.all<Row>(named, (error, rows) => (error === null ? resolve(rows) : reject(error)));
    });
  }

  private statement(text: string): Promise<sqlite3.Statement> {
    const known = this.statements.get(text);
    if (known) return known;
    const prepared = new Promise<sqlite3.Statement>((resolve, reject) => {
      const statement = this.database.prepare(text, (error: Error | null) =>
        error === null ? resolve(statement) : reject(error),
      );
    });
    this.statements.set(text, prepared);
    prepared.catch(() => this.statements.delete(text));
    return prepared;
  }

  async close(): Promise<void> {
    for (const prepared of await Promise.allSettled(this.statements.values()))
      if (prepared.status === 'fulfilled')
        await new Promise<void>((resolve) => prepared.value.finalize(() => resolve()));
    await new Promise<void>((resolve, reject) => {
      this.database.close((error) => (error === null ? resolve() : reject(error)));
    });
  }
}

/**
 * Reads on connections of its own, which can change nothing. For what every request asks and for lists, where
 * building models would take longer than reading. It sees all that has been committed.
 */
export class Reader {
  private readonly connections: ReadConnection[] = [];
  private readonly free: ReadConnection[] = [];
  private readonly waiting: ((connection: ReadConnection) => void)[] = [];

  constructor(private readonly path: string) {}

  /** The texts read with so far. */
  get texts(): string[] {
    return [...new Set(this.connections.flatMap(({ statements }) => [...statements.keys()]))];
  }

  async all<Row>(text: string, values: ReadValues): Promise<Row[]> {
    const connection = await this.take();
    try {
      return await connection.all<Row>(text, values);
    } finally {
      const next = this.waiting.shift();
      if (next) next(connection);
      else this.free.push(connection);
    }
  }

  async close(): Promise<void> {
    this.free.length = 0;
    await Promise.all(this.connections.splice(0).map((one) => one.close()));
  }

  private take(): ReadConnection | Promise<ReadConnection> {
    const free = this.free.pop();
    if (free) return free;
    if (this.connections.length < CONNECTIONS) {
      const made = new ReadConnection(this.path);
      this.connections.push(made);
      return made;
    }
    return new Promise((resolve) => this.waiting.push(resolve));
  }
}

/** A time as the file holds it. */
export const asKept = (time: Date) => time.toISOString().replace('T', ' ').replace('Z', ' +00:00');
