import { eq } from 'drizzle-orm'
import { describe, expect, it } from 'vitest'
import { lotListSchema } from '#shared/contracts/lots'
import { nonconformanceListSchema } from '#shared/contracts/returns'
import { decisions, lots } from '../../server/database/schema/lots'
import { logbook } from '../../server/database/schema/logbook'
import { measurements } from '../../server/database/schema/measurements'
import { people, suppliers } from '../../server/database/schema/people'
import { nonconformanceEntries, nonconformances, notices } from '../../server/database/schema/returns'
import type { Context, Services } from '../../server/services/context'
import { DomainError } from '../../server/services/domain-error'
import { listLots } from '../../server/services/lots/list-lots'
import { csvCell, getLotResults, resultsAsCsv } from '../../server/services/lots/lot-results'
import { resendNotice } from '../../server/services/notices/resend-notice'
import { acknowledgeNonconformance } from '../../server/services/returns/acknowledge'
import { addMessage } from '../../server/services/returns/add-message'
import { answerNonconformance } from '../../server/services/returns/answer'
import { addWorkingDays, plantDay } from '../../server/services/returns/answer-due'
import { closeNonconformance } from '../../server/services/returns/close-nonconformance'
import { decideDisposition } from '../../server/services/returns/disposition'
import { listNonconformances } from '../../server/services/returns/list-nonconformances'
import { getNonconformancePage } from '../../server/services/returns/nonconformance-page'
import { openNonconformance } from '../../server/services/returns/open-nonconformance'
import { reviewAnswer } from '../../server/services/returns/review-answer'
import { rejectLot } from './support/rejected-lot'
import { addPerson, addPlant, as, openTestServices, PASSWORD } from './support/services'

const ANSWER = { containment: 'Stock was sorted.', cause: 'A worn stamping die.', correctiveAction: 'The die was replaced.' }

async function setUp() {
  const test = openTestServices()
  const { services } = test
  const plant = addPlant(services)
  const stranger = services.db.insert(suppliers).values({ code: 'AMBREL', name: 'Ambrel Coilworks', createdAt: services.clock().toISOString() }).returning().get()
  const strangerContact = addPerson(services, 'supplier', { supplierId: stranger.id, noticeRank: 1 })
  const rejected = await rejectLot(services, plant)
  return {
    ...test, plant, stranger, rejected, number: rejected.number,
    engineer: as(services, plant.engineer), supplier: as(services, plant.contact), foreign: as(services, strangerContact),
  }
}

const stored = (services: Services, number: string) => services.db.select().from(nonconformances).where(eq(nonconformances.number, number)).get()!
const actions = (services: Services) => services.db.select().from(logbook).all().map(row => row.action)
const query = (input: Record<string, unknown> = {}) => nonconformanceListSchema.parse(input)

function refusal(run: () => unknown): { code: string; message: string } {
  try {
    run()
  }
  catch (error) {
    if (error instanceof DomainError) return { code: error.code, message: error.message }
    throw error
  }
  throw new Error('nothing was refused')
}

describe('openNonconformance', () => {
  it('puts the lot on hold, asks for the answer in ten working days, and writes entry and logbook', async () => {
    const { services, rejected, number } = await setUp()
    expect(services.db.select().from(lots).where(eq(lots.id, rejected.lot.id)).get()!.state).toBe('on-hold')
    expect(stored(services, number)).toMatchObject({ number: 'N-2026-0001', state: 'open', openedAt: '2026-12-01T08:00:00.000Z', answerDueOn: '2026-12-15' })
    expect(services.db.select().from(nonconformanceEntries).all().map(row => row.kind)).toEqual(['opened'])
    expect(actions(services)).toContain('nonconformance.opened')
  })

  it('numbers without gaps when a transaction is rolled back, and anew each year of the plant', async () => {
    const { services, plant, rejected, setTime } = await setUp()
    expect(() => services.db.transaction((tx) => {
      tx.delete(nonconformanceEntries).run()
      tx.delete(notices).run()
      tx.delete(nonconformances).run()
      tx.update(lots).set({ state: 'rejected' }).where(eq(lots.id, rejected.lot.id)).run()
      expect(openNonconformance(services, tx, { actorId: plant.inspector.personId, lotId: rejected.lot.id, paperId: rejected.paper.id }).number).toBe('N-2026-0002')
      throw new Error('rolled back')
    })).toThrow('rolled back')
    expect((await rejectLot(services, plant, { supplierLot: 'second' })).number).toBe('N-2026-0002')
    // 23:30 UTC on the last day of the year is the next year in Berlin.
    setTime('2027-12-31T23:30:00.000Z')
    services.db.update(decisions).set({ signedAt: services.clock().toISOString() }).run()
    await expect(rejectLot(services, plant, { supplierLot: 'third' })).rejects.toThrow(/N-2028-0001/)
  })

  it('refuses a lot that was not rejected', async () => {
    const { services, plant, rejected } = await setUp()
    const open = () => services.db.transaction(tx => openNonconformance(services, tx, { actorId: plant.inspector.personId, lotId: rejected.lot.id, paperId: rejected.paper.id }))
    expect(open).toThrow(RangeError)
  })
})

describe('addWorkingDays', () => {
  it.each([['2026-12-01', 10, '2026-12-15'], ['2026-12-04', 1, '2026-12-07'], ['2026-12-05', 1, '2026-12-07'], ['2026-12-06', 1, '2026-12-07'], ['2026-12-31', 1, '2027-01-01']])('from %s, %i working days on is %s', (day, count, result) => {
    expect(addWorkingDays(day, count)).toBe(result)
  })

  it('names the domain of its arguments', () => {
    expect(() => addWorkingDays('tomorrow', 1)).toThrow(RangeError)
    for (const count of [0, 1.5, 1001]) expect(() => addWorkingDays('2026-12-01', count)).toThrow(RangeError)
  })

  it('takes the day from the plant\'s clock', () => {
    expect(plantDay(new Date('2026-12-01T23:30:00Z'), 'Europe/Berlin')).toBe('2026-12-02')
    expect(plantDay(new Date('2026-12-01T23:30:00Z'), 'America/New_York')).toBe('2026-12-01')
  })
})

describe('the supplier\'s side', () => {
  it('acknowledging twice changes nothing and gives the same answer', async () => {
    const { services, supplier, number, setTime } = await setUp()
    const first = acknowledgeNonconformance(supplier, number)
    const count = actions(services).length
    setTime('2026-12-02T08:00:00.000Z')
    expect(acknowledgeNonconformance(supplier, number)).toEqual(first)
    expect(first).toEqual({ acknowledgedAt: '2026-12-01T08:00:00.000Z' })
    expect(stored(services, number)).toMatchObject({ state: 'acknowledged', acknowledgedAt: first.acknowledgedAt })
    expect(actions(services)).toHaveLength(count)
  })

  it('an answer needs the acknowledgement first, and keeps its parts', async () => {
    const { supplier, number } = await setUp()
    expect(refusal(() => answerNonconformance(supplier, number, ANSWER))).toMatchObject({ code: 'conflict' })
    acknowledgeNonconformance(supplier, number)
    answerNonconformance(supplier, number, ANSWER)
    const page = getNonconformancePage(supplier, number)
    expect(page.state).toBe('answered')
    expect(page.entries.map(entry => [entry.kind, entry.side])).toEqual([['opened', 'plant'], ['acknowledged', 'supplier'], ['answer-containment', 'supplier'], ['answer-cause', 'supplier'], ['answer-corrective', 'supplier']])
    expect(refusal(() => answerNonconformance(supplier, number, ANSWER))).toMatchObject({ code: 'conflict' })
  })

  it('another supplier\'s number is answered exactly like one that does not exist', async () => {
    const { foreign, rejected, number } = await setUp()
    const attempts: ((context: Context, number: string) => unknown)[] = [
      getNonconformancePage, acknowledgeNonconformance, (context, each) => answerNonconformance(context, each, ANSWER), (context, each) => addMessage(context, each, 'hello'),
    ]
    for (const attempt of attempts) {
      const other = refusal(() => attempt(foreign, number))
      const unknown = refusal(() => attempt(foreign, 'N-2026-9999'))
      expect(other).toEqual({ code: 'not-found', message: unknown.message.replace('N-2026-9999', number) })
    }
    expect(refusal(() => getLotResults(foreign, rejected.lot.number)).code).toBe('not-found')
    expect(listNonconformances(foreign, query())).toEqual({ rows: [], total: 0, pageSize: 25, suppliers: [] })
    expect(listNonconformances(foreign, query({ supplier: 'TUVALO' })).total).toBe(0)
  })

  it('a contact without a company finds nothing', async () => {
    const { services, number } = await setUp()
    const lost = as(services, { personId: 1, name: 'x', role: 'supplier', supplierId: null })
    expect(refusal(() => getNonconformancePage(lost, number)).code).toBe('not-found')
    expect(listNonconformances(lost, query()).total).toBe(0)
  })

  it('sees the mails to its own people only, and no server errors', async () => {
    const { services, supplier, engineer, number } = await setUp()
    acknowledgeNonconformance(supplier, number)
    services.db.update(notices).set({ lastError: 'internal host name' }).run()
    expect(getNonconformancePage(engineer, number).notices.map(notice => notice.recipientAddress)).toEqual(['quality@tuvalo.example', 'engineer@kestrelfold.example', 'engineer2@kestrelfold.example'])
    expect(getNonconformancePage(supplier, number).notices).toMatchObject([{ recipientAddress: 'quality@tuvalo.example', lastError: null }])
  })
})

describe('the engineer\'s side', () => {
  it('decides the disposition once, with the reason, and tells the supplier', async () => {
    const { services, engineer, rejected, number } = await setUp()
    await decideDisposition(engineer, number, { disposition: 'return-to-supplier', reason: 'too many fail' })
    expect(services.db.select().from(lots).where(eq(lots.id, rejected.lot.id)).get()!.state).toBe('dispositioned')
    expect(getNonconformancePage(engineer, number).disposition).toMatchObject({ kind: 'return-to-supplier', reason: 'too many fail', by: 'Mara Quill' })
    expect(getNonconformancePage(engineer, number).entries.at(-1)).toMatchObject({ kind: 'disposition', text: 'Return to the supplier: the whole lot goes back.\ntoo many fail' })
    expect(services.db.select().from(notices).all().at(-1)).toMatchObject({ recipientAddress: 'quality@tuvalo.example' })
    expect(services.db.select().from(notices).all().at(-1)!.text).toContain('Return to the supplier: the whole lot goes back.')
    await expect(decideDisposition(engineer, number, { disposition: 'scrap', reason: 'changed my mind' })).rejects.toMatchObject({ code: 'conflict' })
    expect(stored(services, number).disposition).toBe('return-to-supplier')
  })

  it('signs a concession with the password, and nothing changes without it', async () => {
    const { services, engineer, rejected, number } = await setUp()
    const concession = { disposition: 'concession' as const, reason: 'used in test rigs only' }
    for (const password of ['', 'wrong']) await expect(decideDisposition(engineer, number, { ...concession, password })).rejects.toMatchObject({ code: 'wrong-password' })
    expect(services.db.select().from(lots).where(eq(lots.id, rejected.lot.id)).get()!.state).toBe('on-hold')
    await decideDisposition(engineer, number, { ...concession, password: PASSWORD })
    expect(stored(services, number).disposition).toBe('concession')
  })

  it('a signature does not stand when the password changed meanwhile', async () => {
    const { services, engineer, plant, number } = await setUp()
    const changing = { ...engineer, passwords: { ...engineer.passwords, verify: async (hash: string, password: string) => {
      const right = await engineer.passwords.verify(hash, password)
      services.db.update(people).set({ passwordVersion: 2 }).where(eq(people.id, plant.engineer.personId)).run()
      return right
    } } }
    await expect(decideDisposition(changing, number, { disposition: 'concession', reason: 'used in test rigs', password: PASSWORD })).rejects.toMatchObject({ code: 'conflict' })
    expect(stored(services, number).disposition).toBeNull()
  })

  it('goes the whole way: acknowledged, answered, sent back, answered again, accepted, closed with its lot', async () => {
    const { services, engineer, supplier, rejected, number, woken } = await setUp()
    acknowledgeNonconformance(supplier, number)
    answerNonconformance(supplier, number, ANSWER)
    reviewAnswer(engineer, number, { outcome: 'sent-back', reason: 'the cause does not explain order 14' })
    expect(stored(services, number).state).toBe('sent-back')
    answerNonconformance(supplier, number, { ...ANSWER, preventiveAction: 'The die is inspected monthly.' })
    reviewAnswer(engineer, number, { outcome: 'accepted', reason: 'plausible' })
    expect(refusal(() => closeNonconformance(engineer, number, 'next lots conform'))).toMatchObject({ code: 'conflict' })
    expect(stored(services, number).state).toBe('accepted-answer')
    await decideDisposition(engineer, number, { disposition: 'scrap', reason: 'cheap motors' })
    closeNonconformance(engineer, number, 'the next three lots conform')
    expect(stored(services, number)).toMatchObject({ state: 'closed', closedAt: '2026-12-01T08:00:00.000Z' })
    expect(services.db.select().from(lots).where(eq(lots.id, rejected.lot.id)).get()!.state).toBe('closed')
    expect(refusal(() => addMessage(supplier, number, 'one more thing')).code).toBe('conflict')
    expect(getNonconformancePage(engineer, number).allowed).toEqual(['resend'])
    expect(actions(services).filter(action => action.startsWith('nonconformance.'))).toEqual([
      'nonconformance.opened', 'nonconformance.acknowledged', 'nonconformance.answered', 'nonconformance.answer-sent-back', 'nonconformance.answered', 'nonconformance.answer-accepted', 'nonconformance.disposition', 'nonconformance.closed',
    ])
    expect(woken.filter(job => job === 'outbox')).toHaveLength(7)
  })

  it('a notice is sent again only under its own nonconformance', async () => {
    const { services, engineer, plant, number } = await setUp()
    const other = await rejectLot(services, plant, { supplierLot: 'second' })
    const id = getNonconformancePage(engineer, number).notices[0]!.id
    expect(refusal(() => resendNotice(engineer, other.number, id)).code).toBe('not-found')
  })
})

describe('the page of a nonconformance', () => {
  it('shows the failing motors with figures, limits, rings, files and likely origin', async () => {
    const { engineer, rejected, number } = await setUp()
    const page = getNonconformancePage(engineer, number)
    expect(page.failing.map(motor => motor.serial)).toEqual(['71-0004', '71-0005'])
    expect(page.failing[0]).toMatchObject({ verdict: 'fail', failures: [{ label: 'Cogging, peak to peak', value: 6.83e-3, upper: 5.4e-3, unit: 'N·m' }], files: [{ name: '71-0004.csv', sha256: rejected.file, size: 20 }] })
    // One period of order 14 holds 1024/14 points, so the largest of them lies within 0.5 % of the amplitude 2.4 mN·m.
    expect(Math.max(...page.failing[0]!.ring)).toBeCloseTo(2.4e-3, 4)
    // Both motors show the same finding, which is said once.
    expect(page.explanation).toHaveLength(1)
    expect(page.explanation[0]).toContain('the stator side')
    expect(page).toMatchObject({ limitPeakToPeakNm: 5.4e-3, paper: { number: rejected.paper.number, checkLink: `/check/${rejected.paper.token}`, pdfReady: false }, part: { designOrder: 84 } })
  })

  it('offers each role what it may do, and nothing more', async () => {
    const { services, engineer, supplier, plant, number } = await setUp()
    expect(getNonconformancePage(engineer, number).allowed).toEqual(['disposition', 'message', 'resend'])
    expect(getNonconformancePage(supplier, number).allowed).toEqual(['acknowledge', 'message'])
    expect(getNonconformancePage(as(services, plant.inspector), number).allowed).toEqual([])
    acknowledgeNonconformance(supplier, number)
    expect(getNonconformancePage(supplier, number).allowed).toEqual(['answer', 'message'])
    answerNonconformance(supplier, number, ANSWER)
    expect(getNonconformancePage(engineer, number).allowed).toEqual(['review', 'disposition', 'message', 'resend'])
  })

  it('is overdue from the day after the answer is due in the plant, until the answer comes', async () => {
    const { supplier, number, setTime } = await setUp()
    // 23:30 on 15 December in Berlin.
    setTime('2026-12-15T22:30:00.000Z')
    expect(getNonconformancePage(supplier, number).overdue).toBe(false)
    setTime('2026-12-15T23:00:00.000Z')
    expect(getNonconformancePage(supplier, number).overdue).toBe(true)
    acknowledgeNonconformance(supplier, number)
    answerNonconformance(supplier, number, ANSWER)
    expect(getNonconformancePage(supplier, number).overdue).toBe(false)
  })
})

describe('listNonconformances', () => {
  it('filters by state, supplier and text, and sorts', async () => {
    const { services, plant, stranger, engineer, supplier, number } = await setUp()
    const second = await rejectLot(services, plant, { supplierLot: 'AB-1', supplierId: stranger.id })
    const numbers = (input: Record<string, unknown>) => listNonconformances(engineer, query(input)).rows.map(row => row.number)
    expect(numbers({ sort: 'number', order: 'rising' })).toEqual([number, second.number])
    expect(numbers({ sort: 'number', order: 'falling' })).toEqual([second.number, number])
    expect(numbers({ sort: 'supplier', order: 'rising' })).toEqual([second.number, number])
    expect(numbers({ supplier: 'AMBREL' })).toEqual([second.number])
    expect(numbers({ text: 'AB-1' })).toEqual([second.number])
    expect(numbers({ text: '%' })).toHaveLength(2)
    acknowledgeNonconformance(supplier, number)
    answerNonconformance(supplier, number, ANSWER)
    expect(numbers({ state: 'answered' })).toEqual([number])
    expect(numbers({ state: 'waiting' })).toEqual([second.number])
    expect(numbers({ state: 'open' })).toHaveLength(2)
    expect(numbers({ state: 'closed' })).toEqual([])
    expect(listNonconformances(engineer, query()).suppliers).toEqual([{ code: 'AMBREL', name: 'Ambrel Coilworks' }, { code: 'TUVALO', name: 'Tuvalo Precision Drives' }])
    expect(listNonconformances(supplier, query()).rows.map(row => row.number)).toEqual([number])
  })

  it('gives 25 a page', async () => {
    const { services, plant, engineer } = await setUp()
    for (let count = 2; count <= 26; count++) await rejectLot(services, plant, { supplierLot: `lot ${count}` })
    expect(listNonconformances(engineer, query())).toMatchObject({ total: 26, pageSize: 25 })
    expect(listNonconformances(engineer, query()).rows).toHaveLength(25)
    expect(listNonconformances(engineer, query({ page: 2 })).rows).toHaveLength(1)
    expect(listNonconformances(engineer, query({ page: 3 })).rows).toEqual([])
  })
})

describe('the supplier\'s list of lots', () => {
  it('holds its own lots with the motors measured and nonconforming, counting the first attempt that was not voided', async () => {
    const { services, plant, supplier, foreign, rejected } = await setUp()
    const list = (context: Context) => listLots(context, lotListSchema.parse({})).rows.map(({ number, sampleSize, measured, nonconforming }) => ({ number, sampleSize, measured, nonconforming }))
    expect(list(supplier)).toEqual([{ number: rejected.lot.number, sampleSize: 5, measured: 5, nonconforming: 2 }])
    expect(list(foreign)).toEqual([])
    const failed = services.db.select().from(measurements).where(eq(measurements.verdict, 'fail')).all()[0]!
    const again = { ...failed, id: undefined, attempt: 2, verdict: 'pass' as const, reason: 'coupling slipped' }
    services.db.insert(measurements).values(again).run()
    expect(list(supplier)[0]).toMatchObject({ measured: 5, nonconforming: 2 })
    services.db.update(measurements).set({ voidedAt: services.clock().toISOString(), voidedById: plant.engineer.personId, voidReason: 'coupling slipped' }).where(eq(measurements.id, failed.id)).run()
    expect(list(supplier)[0]).toMatchObject({ measured: 5, nonconforming: 1 })
  })
})

describe('the results of a lot', () => {
  it('come as JSON with every motor, and as CSV with one row a characteristic', async () => {
    const { supplier, rejected } = await setUp()
    const results = getLotResults(supplier, rejected.lot.number)
    expect(results.motors).toHaveLength(5)
    expect(results.motors[3]).toMatchObject({ serial: '71-0004', verdict: 'fail', files: [{ name: '71-0004.csv', sha256: rejected.file }], characteristics: [{ key: 'cogging.peakToPeak', value: 6.83e-3, unit: 'N·m' }] })
    const lines = resultsAsCsv(results).split('\r\n')
    expect(lines).toHaveLength(7)
    expect(lines[0]!.startsWith('\uFEFFlot,supplier lot,part,')).toBe(true)
    expect(lines[4]).toContain(',71-0004,2026-12-01T08:00:00.000Z,fail,cogging.peakToPeak,"Cogging, peak to peak",0.00683,N·m,0.00005,,0.0054,fail,')
  })

  it.each([['=1+1', '"\'=1+1"'], ['+1', '"\'+1"'], ['-1', '"\'-1"'], ['@a', '"\'@a"'], ['\t=1', '"\'\t=1"'], [' =1', '"\' =1"'], ['71-0004', '71-0004'], ['a"b', '"a""b"'], ['a,b', '"a,b"'], ['a\nb', '"a\nb"']])('guards the text %j as %j', (text, cell) => {
    expect(csvCell(text)).toBe(cell)
  })

  it('leaves negative numbers numbers', () => {
    expect([csvCell(-0.0012), csvCell(0), csvCell(null), csvCell(undefined)]).toEqual(['-0.0012', '0', '', ''])
  })
})
