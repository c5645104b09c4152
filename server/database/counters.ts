import { eq, sql } from 'drizzle-orm'
import { counters } from './schema/papers'
import type { Transaction } from './client'

/**
 * Takes the next value of a counter inside the caller's transaction: when that is rolled back, so is the counter, so that numbers have no gaps.
 *
 * @param name counter, for example `paper:2026`.
 * @returns 1, 2, 3 …
 */
export function takeNumber(tx: Transaction, name: string): number {
  tx.insert(counters).values({ name, value: 1 }).onConflictDoUpdate({ target: counters.name, set: { value: sql`${counters.value} + 1` } }).run()
  return tx.select({ value: counters.value }).from(counters).where(eq(counters.name, name)).get()!.value
}

/** Year of a moment in the plant's time zone. */
export function plantYear(at: Date, timeZone: string): number {
  return Number(new Intl.DateTimeFormat('en-GB', { timeZone, year: 'numeric' }).format(at))
}
