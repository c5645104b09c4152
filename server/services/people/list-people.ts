import { and, asc, desc, eq, like, or, sql } from 'drizzle-orm'
import type { z } from 'zod'
import type { PeopleListAnswer, peopleListSchema } from '#shared/contracts/people'
import { people, sessions, suppliers } from '../../database/schema/people'
import type { Context } from '../context'

const PAGE_SIZE = 25

/** One page of the accounts; passwords never leave the database. */
export function listPeople(context: Context, query: z.output<typeof peopleListSchema>): PeopleListAnswer {
  const { db } = context
  const pattern = `%${query.text.replaceAll(/[%_]/g, '')}%`
  const where = and(
    query.role ? eq(people.role, query.role) : undefined,
    query.text ? or(like(people.name, pattern), like(people.email, pattern), like(suppliers.name, pattern)) : undefined,
  )
  const column = people[query.sort]
  const lastSeenAt = sql<string | null>`(select max(${sessions.seenAt}) from ${sessions} where ${sessions.personId} = ${people.id})`
  const rows = db.select({
    id: people.id, name: people.name, email: people.email, role: people.role, supplierCode: suppliers.code, supplier: suppliers.name, noticeRank: people.noticeRank,
    disabledAt: people.disabledAt, createdAt: people.createdAt, lastSeenAt,
  }).from(people).leftJoin(suppliers, eq(suppliers.id, people.supplierId)).where(where).orderBy(query.order === 'falling' ? desc(column) : asc(column), asc(people.id)).limit(PAGE_SIZE).offset((query.page - 1) * PAGE_SIZE).all()
  const total = db.select({ n: sql<number>`count(*)` }).from(people).leftJoin(suppliers, eq(suppliers.id, people.supplierId)).where(where).get()!.n
  return { rows, total, pageSize: PAGE_SIZE }
}
