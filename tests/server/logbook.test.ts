import { desc } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { installLogbookTriggers } from '../../server/database/logbook-triggers'
import { logbook } from '../../server/database/schema/logbook'
import { appendToLogbook } from '../../server/services/logbook/append'
import { checkLogbook } from '../../server/services/logbook/check-logbook'
import { openTestServices } from './support/services'

function filled(entries = 5) {
  const { services } = openTestServices()
  for (let index = 0; index < entries; index++) {
    services.db.transaction(tx => void appendToLogbook(services, tx, { actorId: null, action: 'lot.received', subjectKind: 'lot', subjectId: `26-000${index}`, content: { quantity: index } }))
  }
  return { services, sqlite: services.db.$client, rows: () => services.db.select().from(logbook).all() }
}

describe('the logbook', () => {
  it('is sound as written', () => {
    expect(checkLogbook(filled().services.db)).toMatchObject({ ok: true, entries: 5, problem: null })
  })

  it.each([
    ['a change', 'UPDATE logbook SET content = \'{}\' WHERE sequence = 2'],
    ['a removal', 'DELETE FROM logbook WHERE sequence = 5'],
    ['a replacement', 'INSERT OR REPLACE INTO logbook SELECT sequence, at, actor_id, \'lot.accepted\', subject_kind, subject_id, content, salt, content_hash, previous_hash, entry_hash FROM logbook WHERE sequence = 3'],
    ['an entry out of order', 'INSERT INTO logbook SELECT 9, at, actor_id, action, subject_kind, subject_id, content, salt, content_hash, entry_hash, \'x\' FROM logbook WHERE sequence = 5'],
    ['an entry that does not continue the chain', 'INSERT INTO logbook SELECT 6, at, actor_id, action, subject_kind, subject_id, content, salt, content_hash, \'forged\', \'x\' FROM logbook WHERE sequence = 5'],
  ])('refuses %s', (_, statement) => {
    const { sqlite, rows } = filled()
    const before = rows()
    expect(() => sqlite.exec(statement)).toThrow(/logbook/)
    expect(rows()).toEqual(before)
  })

  it.each([
    ['changed content', 'UPDATE logbook SET content = \'{"quantity":99}\' WHERE sequence = 3', 3, /no longer says what was written/],
    ['a changed time', 'UPDATE logbook SET at = \'2020-01-01T00:00:00.000Z\' WHERE sequence = 2', 2, /no longer says/],
    ['a removed entry', 'DELETE FROM logbook WHERE sequence = 3', 4, /Entry 3 is missing/],
    ['a changed hash', 'UPDATE logbook SET entry_hash = \'0000\' WHERE sequence = 4', 4, /does not follow from its content/],
  ])('finds %s that was forced past the triggers, and names the entry', (_, statement, sequence, sentence) => {
    const { services, sqlite } = filled()
    sqlite.exec('DROP TRIGGER logbook_no_update; DROP TRIGGER logbook_no_delete;')
    sqlite.exec(statement)
    const check = checkLogbook(services.db)
    expect(check).toMatchObject({ ok: false, problem: { sequence } })
    expect(check.problem!.sentence).toMatch(sentence)
  })

  it('is guarded again after triggers were lost, as a table rebuild does', () => {
    const { sqlite } = filled()
    sqlite.exec('DROP TRIGGER logbook_no_update')
    installLogbookTriggers(sqlite)
    expect(() => sqlite.exec('UPDATE logbook SET content = \'{}\'')).toThrow(/cannot be changed/)
  })

  it('takes back the entry when its transaction is rolled back', () => {
    const { services, rows } = filled(2)
    expect(() => services.db.transaction((tx) => {
      appendToLogbook(services, tx, { actorId: null, action: 'lot.received', subjectKind: 'lot', subjectId: 'x' })
      throw new Error('no')
    })).toThrow('no')
    expect(rows()).toHaveLength(2)
    services.db.transaction(tx => void appendToLogbook(services, tx, { actorId: null, action: 'lot.received', subjectKind: 'lot', subjectId: 'y' }))
    expect(services.db.select().from(logbook).orderBy(desc(logbook.sequence)).limit(1).get()).toMatchObject({ sequence: 3, subjectId: 'y' })
  })
})
