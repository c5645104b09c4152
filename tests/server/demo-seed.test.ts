import { eq, sql } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { decisions, lots } from '../../server/database/schema/lots'
import { nonconformances } from '../../server/database/schema/returns'
import { seedDemo } from '../../server/database/seed/seed-demo'
import { checkLogbook } from '../../server/services/logbook/check-logbook'
import { openTestServices } from './support/services'

describe('seedDemo', () => {
  it('plays the small scenario through the services: decided lots, one rejected, three waiting, a sound logbook', async () => {
    const { services } = openTestServices()
    await seedDemo(services, 'small')
    const outcomes = services.db.select({ outcome: decisions.outcome, n: sql<number>`count(*)` }).from(decisions).groupBy(decisions.outcome).all()
    expect(Object.fromEntries(outcomes.map(row => [row.outcome, row.n]))).toEqual({ accepted: 5, rejected: 1 })
    expect(services.db.select().from(lots).where(eq(lots.state, 'drawn')).all()).toHaveLength(3)
    expect(services.db.select().from(nonconformances).all()).toHaveLength(1)
    expect(checkLogbook(services.db)).toMatchObject({ ok: true, problem: null })
  })

  it('leaves a database that holds people alone', async () => {
    const { services } = openTestServices()
    await seedDemo(services, 'small')
    const before = services.db.select({ n: sql<number>`count(*)` }).from(lots).get()
    await seedDemo(services, 'small')
    expect(services.db.select({ n: sql<number>`count(*)` }).from(lots).get()).toEqual(before)
  })
})
