import Database from 'better-sqlite3'
import { drizzle } from 'drizzle-orm/better-sqlite3'
import { migrate } from 'drizzle-orm/better-sqlite3/migrator'
import { installLogbookTriggers } from './logbook-triggers'
import * as drift from './schema/drift'
import * as logbook from './schema/logbook'
import * as lots from './schema/lots'
import * as measurements from './schema/measurements'
import * as papers from './schema/papers'
import * as parts from './schema/parts'
import * as people from './schema/people'
import * as returns from './schema/returns'
import * as rigs from './schema/rigs'

const schema = { ...people, ...parts, ...rigs, ...lots, ...measurements, ...papers, ...returns, ...logbook, ...drift }

/** The database as services use it; a transaction has the same methods. */
export type EvenlotDatabase = ReturnType<typeof connect>
export type Transaction = Parameters<Parameters<EvenlotDatabase['transaction']>[0]>[0]
/** What both a database and a transaction can do. */
export type Reader = Pick<EvenlotDatabase, 'select' | 'selectDistinct' | 'insert' | 'update' | 'delete' | 'query' | 'run' | 'all' | 'get'>

function connect(path: string) {
  const sqlite = new Database(path)
  sqlite.pragma('journal_mode = WAL')
  sqlite.pragma('synchronous = FULL')
  sqlite.pragma('busy_timeout = 5000')
  sqlite.pragma('recursive_triggers = ON')
  sqlite.pragma('foreign_keys = ON')
  return drizzle(sqlite, { schema })
}

/**
 * Opens the database file, brings its shape up to date and arms the logbook's triggers.
 *
 * Foreign keys are off while migrations run: a table rebuild inside drizzle's transaction would otherwise delete child rows; they are checked afterwards.
 *
 * @param path SQLite file; made when missing.
 * @param migrationsFolder folder with drizzle-kit's migrations.
 * @throws Error when a migration leaves a dangling reference.
 */
export function openDatabase(path: string, migrationsFolder: string): EvenlotDatabase {
  const database = connect(path)
  const sqlite = database.$client
  sqlite.pragma('foreign_keys = OFF')
  migrate(database, { migrationsFolder })
  const dangling = sqlite.pragma('foreign_key_check') as unknown[]
  if (dangling.length > 0) throw new Error(`After the migration ${dangling.length} rows point at nothing; the database was left as it is. Restore the backup.`)
  sqlite.pragma('foreign_keys = ON')
  installLogbookTriggers(sqlite)
  return database
}
