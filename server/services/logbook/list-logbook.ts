import { and, asc, desc, eq, gte, lt, sql } from 'drizzle-orm'
import type { z } from 'zod'
import type { LogbookListAnswer, LogbookRow, logbookListSchema } from '#shared/contracts/logbook'
import { logbook } from '../../database/schema/logbook'
import { people } from '../../database/schema/people'
import type { Context } from '../context'

const PAGE_SIZE = 50

/** One page of the logbook, filtered. */
export function listLogbook(context: Context, query: z.output<typeof logbookListSchema>): LogbookListAnswer {
  const { db } = context
  const where = and(
    query.action ? eq(logbook.action, query.action) : undefined,
    query.subjectKind ? eq(logbook.subjectKind, query.subjectKind) : undefined,
    query.subjectId ? eq(logbook.subjectId, query.subjectId) : undefined,
    query.actor ? eq(logbook.actorId, query.actor) : undefined,
    query.from ? gte(logbook.at, query.from) : undefined,
    query.to ? lt(logbook.at, dayAfter(query.to)) : undefined,
  )
  const rows = db.select({ entry: logbook, actor: people.name }).from(logbook).leftJoin(people, eq(people.id, logbook.actorId)).where(where)
    .orderBy(query.order === 'falling' ? desc(logbook.sequence) : asc(logbook.sequence)).limit(PAGE_SIZE).offset((query.page - 1) * PAGE_SIZE).all()
  return {
    rows: rows.map(({ entry, actor }) => rowOf(entry, actor)),
    total: db.select({ n: sql<number>`count(*)` }).from(logbook).where(where).get()!.n,
    pageSize: PAGE_SIZE,
    actions: db.selectDistinct({ action: logbook.action }).from(logbook).orderBy(asc(logbook.action)).all().map(row => row.action),
    subjectKinds: db.selectDistinct({ kind: logbook.subjectKind }).from(logbook).orderBy(asc(logbook.subjectKind)).all().map(row => row.kind),
  }
}

function dayAfter(day: string): string {
  return new Date(Date.parse(`${day}T00:00:00Z`) + 86_400_000).toISOString().slice(0, 10)
}

const PAGES: Record<string, (id: string) => string> = {
  lot: id => `/lots/${id}`,
  rig: id => `/rigs/${id}`,
  paper: id => `/papers/${id}`,
  nonconformance: id => `/returns/${id}`,
}

function rowOf(entry: typeof logbook.$inferSelect, actor: string | null): LogbookRow {
  const { sequence, at, action, subjectKind, subjectId, entryHash } = entry
  return { sequence, at, actor, action, subjectKind, subjectId, entryHash, link: PAGES[subjectKind]?.(subjectId) ?? null, content: JSON.parse(entry.content) as Record<string, unknown> }
}
