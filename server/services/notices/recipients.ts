import { and, asc, eq, isNull } from 'drizzle-orm'
import type { Reader } from '../../database/client'
import { people } from '../../database/schema/people'
import type { Recipient } from './write-notice'

const columns = { personId: people.id, name: people.name, address: people.email } as const

/** A supplier's first contacts for notices. */
export function supplierContacts(db: Pick<Reader, 'select'>, supplierId: number): Recipient[] {
  return db.select(columns).from(people).where(and(eq(people.role, 'supplier'), eq(people.supplierId, supplierId), eq(people.noticeRank, 1), isNull(people.disabledAt))).orderBy(asc(people.id)).all()
}

/** The plant's quality engineers. */
export function engineers(db: Pick<Reader, 'select'>): Recipient[] {
  return db.select(columns).from(people).where(and(eq(people.role, 'engineer'), isNull(people.disabledAt))).orderBy(asc(people.id)).all()
}
