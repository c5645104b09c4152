import type { EntryKind } from '#shared/contracts/returns'
import type { Transaction } from '../../database/client'
import { nonconformanceEntries } from '../../database/schema/returns'
import { now } from '../context'
import type { Services } from '../context'

/** Adds to what was said and done about a nonconformance; entries are never changed. */
export function writeEntry(services: Pick<Services, 'clock'>, tx: Transaction, entry: { nonconformanceId: number; kind: EntryKind; text: string; byId: number | null }): void {
  tx.insert(nonconformanceEntries).values({ ...entry, at: now(services) }).run()
}
