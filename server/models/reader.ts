import sqlite3 from 'sqlite3';

/** Connections that read beside each other; a second keeps a long list from holding up a short one. */
const CONNECTIONS = 2;
/** Pages kept by each connection, in kibibytes. */
const CACHE = 32_768;
const PRAGMAS = `PRAGMA busy_timeout = 5000; PRAGMA query_only = ON; PRAGMA cache_size = -${CACHE}`;

/** Values by the names that stand behind `$` in the text; a list goes in as JSON and comes out by `json_each`. */
export type ReadValues = Readonly<Record<string, string | number | null>>;

interface Connection {
  readonly database: sqlite3.Database;
  /** Prepared once each: the texts are constants of the code. */
  readonly statements: Map<string, Promise<sqlite3.Statement>>;
}

/**
 * Reads with prepared statements on connections of its own, which can change nothing. For what every request
 * asks and for lists, where building models would take longer than reading. It sees all that has been committed.
 */
export class Reader {
  private readonly connections: Connection[] = [];
  private turn = 0;

  constructor(private readonly path: string) {}

  /** The texts read with so far. */
  get texts(): string[] {
    return [...new Set(this.connections.flatMap(({ statements }) => [...statements.keys()]))];
  }

  async all<Row>(text: string, values: ReadValues): Promise<Row[]> {
    const statement = await this.statement(text);
    const named = Object.fromEntries(Object.entries(values).map(([name, value]) => [`$${name}`, value]));
    return new Promise((resolve, reject) => {
      statement.all<Row>(named, (error, rows) => (error === null ? resolve(rows) : reject(error)));
    });
  }

  async close(): Promise<void> {
    await Promise.all(this.connections.splice(0).map(closeConnection));
  }

  private statement(text: string): Promise<sqlite3.Statement> {
    this.turn = (this.turn + 1) % CONNECTIONS;
    while (this.connections.length < CONNECTIONS) this.connections.push(openConnection(this.path));
    const { database, statements } = this.connections[this.turn] as Connection;
    const known = statements.get(text);
    if (known) return known;
    const prepared = new Promise<sqlite3.Statement>((resolve, reject) => {
      const statement = database.prepare(text, (error: Error | null) =>
        error === null ? resolve(statement) : reject(error),
      );
    });
    statements.set(text, prepared);
    prepared.catch(() => statements.delete(text));
    return prepared;
  }
}

function openConnection(path: string): Connection {
  const database = new sqlite3.Database(path, sqlite3.OPEN_READWRITE);
  database.exec(PRAGMAS);
  return { database, statements: new Map() };
}

async function closeConnection({ database, statements }: Connection): Promise<void> {
  for (const prepared of await Promise.allSettled(statements.values()))
    if (prepared.status === 'fulfilled')
      await new Promise<void>((resolve) => prepared.value.finalize(() => resolve()));
  await new Promise<void>((resolve, reject) => {
    database.close((error) => (error === null ? resolve() : reject(error)));
  });
}

/** A time as the file holds it. */
export const asKept = (time: Date) => time.toISOString().replace('T', ' ').replace('Z', ' +00:00');
