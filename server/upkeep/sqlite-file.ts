import sqlite3 from 'sqlite3';

/** One SQLite file opened by itself, outside the server. */
export class SqliteFile {
  private constructor(private readonly connection: sqlite3.Database) {}

  static open(path: string, mode: number): Promise<SqliteFile> {
    return new Promise((resolve, reject) => {
      const connection = new sqlite3.Database(path, mode, (error) => {
        if (error) reject(error);
        else resolve(new SqliteFile(connection));
      });
    });
  }

  all<Row>(statement: string, values: readonly string[] = []): Promise<Row[]> {
    return new Promise((resolve, reject) => {
      this.connection.all<Row>(statement, values, (error, rows) => {
        if (error) reject(error);
        else resolve(rows);
      });
    });
  }

  close(): Promise<void> {
    return new Promise((resolve, reject) => {
      this.connection.close((error) => (error ? reject(error) : resolve()));
    });
  }
}
