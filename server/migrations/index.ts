import { SequelizeStorage, Umzug } from 'umzug';

import type { Database } from '../models/database';
import { accountsAndLabs } from './001-accounts-and-labs';
import type { Migration } from './migration';
import { presetsAndLinks } from './002-presets-and-links';
import { auditAndPurge } from './003-audit-and-purge';
import { mailQueue } from './004-mail-queue';
import { invitations } from './005-invitations';
import { assignedSweeps } from './006-assigned-sweeps';
import { commentsAndLinks } from './007-comments-and-links';
import { searchWithinScope } from './008-search-within-scope';
import { mailByClaim } from './009-mail-by-claim';

export const MIGRATIONS: readonly Migration[] = [
  accountsAndLabs,
  presetsAndLinks,
  auditAndPurge,
  mailQueue,
  invitations,
  assignedSweeps,
  commentsAndLinks,
  searchWithinScope,
  mailByClaim,
];

/** Steps the schema forward (`up`) and back (`down`); each step is a transaction of its own. */
export function createMigrator(database: Database) {
  const runAll = (statements: readonly string[]) =>
    database.change(async (transaction) => {
      for (const statement of statements) await database.sequelize.query(statement, { transaction });
    });
  return new Umzug({
    migrations: MIGRATIONS.map(({ name, up, down }) => ({
      name,
      up: () => runAll(up),
      down: () => runAll(down),
    })),
    storage: new SequelizeStorage({ sequelize: database.sequelize, tableName: 'schema_migrations' }),
    logger: undefined,
  });
}
