import type Database from 'better-sqlite3'

/**
 * Makes the logbook append-only: no change, no removal, and the next sequence number or nothing.
 * With `recursive_triggers = ON` an INSERT OR REPLACE fires the delete trigger too. Run after every migration, since a table rebuild drops triggers.
 */
export function installLogbookTriggers(sqlite: Database.Database): void {
  sqlite.exec(`
    DROP TRIGGER IF EXISTS logbook_no_update;
    DROP TRIGGER IF EXISTS logbook_no_delete;
    DROP TRIGGER IF EXISTS logbook_in_order;
    CREATE TRIGGER logbook_no_update BEFORE UPDATE ON logbook
      BEGIN SELECT RAISE(ABORT, 'the logbook cannot be changed'); END;
    CREATE TRIGGER logbook_no_delete BEFORE DELETE ON logbook
      BEGIN SELECT RAISE(ABORT, 'the logbook cannot be shortened'); END;
    CREATE TRIGGER logbook_in_order BEFORE INSERT ON logbook
      WHEN NEW.sequence <> (SELECT COALESCE(MAX(sequence), 0) + 1 FROM logbook)
        OR NEW.previous_hash <> COALESCE((SELECT entry_hash FROM logbook ORDER BY sequence DESC LIMIT 1), '')
      BEGIN SELECT RAISE(ABORT, 'the logbook entry does not continue the chain'); END;
  `)
}
