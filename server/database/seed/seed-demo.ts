import { and, eq, sql } from 'drizzle-orm'
import { suppliers, people } from '../schema/people'
import { calibrations, rigs } from '../schema/rigs'
import { lots, samples } from '../schema/lots'
import { limitSheets, parts, partSuppliers } from '../schema/parts'
import { nonconformances, notices } from '../schema/returns'
import type { Actor, Context, Services } from '../../services/context'
import { decideLot } from '../../services/lots/decide-lot'
import { gatherEvidence } from '../../services/lots/evidence'
import { getLot } from '../../services/lots/find-lot'
import { receiveLot } from '../../services/lots/receive-lot'
import { recordUpload } from '../../services/measuring/record-upload'
import { acknowledgeNonconformance } from '../../services/returns/acknowledge'
import { answerNonconformance } from '../../services/returns/answer'
import { closeNonconformance } from '../../services/returns/close-nonconformance'
import { decideDisposition } from '../../services/returns/disposition'
import { reviewAnswer } from '../../services/returns/review-answer'
import type { SupplierAnswer } from '#shared/contracts/returns'
import { makeRandom } from './generator/random'
import { sampleFile } from './sample-files'
import { lotsToday, pastLots, serialOf } from './scenario/lots'
import type { DemoLot } from './scenario/lots'
import { PARTS } from './scenario/parts'
import { DEMO_PASSWORD, PEOPLE, SUPPLIERS } from './scenario/people'
import { RIGS } from './scenario/rigs'

const DAY_MS = 86_400_000
/** Files of one lot that are analysed at the same time. */
const AT_ONCE = 4

/**
 * Fills an empty database with the demo scenario, through the same services that people use, with a clock that runs through the fourteen months before
 * today and seeded chance. A database that holds people is left alone.
 */
export async function seedDemo(services: Services, size: 'small' | 'full'): Promise<void> {
  if (services.db.select({ n: sql<number>`count(*)` }).from(people).get()!.n > 0) return
  const started = Date.now()
  const today = services.clock()
  const stage = new Stage(services, today)
  // Invented data can be made again: no need to wait for the disk with every row.
  services.db.$client.pragma('synchronous = OFF')
  await seedPeopleAndParts(stage)
  const past = pastLots(today, size)
  for (const lot of past) {
    await stage.playUntil(lot.daysAgo)
    await playLot(stage, lot)
  }
  await stage.playUntil(0)
  for (const lot of lotsToday(today)) {
    if (lot.received) stage.receive({ ...lot, daysAgo: 0.03 }, lot.serialsListed)
  }
  // What the past sent is not delivered anew.
  services.db.update(notices).set({ state: 'sent', sentAt: sql`${notices.createdAt}`, attempts: 1 }).where(eq(notices.state, 'queued')).run()
  services.db.$client.pragma('wal_checkpoint(TRUNCATE)')
  services.db.$client.pragma('synchronous = FULL')
  console.info(`The demo data is ready: ${past.length} past lots in ${Math.round((Date.now() - started) / 1000)} s.`)
}

/** The day that the demo takes for today: the one on which its people were entered, so that lot numbers stay the same. */
export function demoDay(services: Pick<Services, 'db' | 'settings'>): Date {
  const first = services.db.select({ createdAt: sql<string>`min(${people.createdAt})` }).from(people).get()!.createdAt
  return new Date(Date.parse(first) + 450 * DAY_MS)
}

/** The services with a clock and chance of the stage's own, and the people who act. */
class Stage {
  time: number
  private readonly random = makeRandom('demo')
  private readonly actors = new Map<string, Actor>()
  private readonly agenda: { daysAgo: number; hour: number; act: () => Promise<void> | void }[] = []

  constructor(readonly services: Services, readonly today: Date) {
    this.time = today.getTime() - 450 * DAY_MS
  }

  /** Everything as in the server, but the clock, the chance, and passwords that are taken as typed. */
  private get acting(): Services {
    return { ...this.services, clock: () => new Date(this.time), randomBytes: length => this.random.bytes(length), passwords: { hash: this.services.passwords.hash, verify: async () => true }, wake: () => undefined }
  }

  addActor(email: string, actor: Actor): void {
    this.actors.set(email, actor)
  }

  as(email: string): Context {
    return { ...this.acting, actor: this.actors.get(email)! }
  }

  /** The notices of the past arrived; they are not sent again. */
  deliverMail(nonconformanceId: number): void {
    const { db } = this.services
    db.update(notices).set({ state: 'sent', sentAt: sql`${notices.createdAt}`, attempts: 1 }).where(eq(notices.nonconformanceId, nonconformanceId)).run()
    db.update(nonconformances).set({ state: 'notified' }).where(and(eq(nonconformances.id, nonconformanceId), eq(nonconformances.state, 'open'))).run()
  }

  /** Something that happens later, between the lots that come until then. */
  later(daysAgo: number, hour: number, act: () => Promise<void> | void): void {
    this.agenda.push({ daysAgo, hour, act })
    this.agenda.sort((a, b) => b.daysAgo - a.daysAgo || a.hour - b.hour)
  }

  async playUntil(daysAgo: number): Promise<void> {
    while (this.agenda.length > 0 && this.agenda[0]!.daysAgo > daysAgo) {
      const next = this.agenda.shift()!
      this.at(next.daysAgo, next.hour)
      await next.act()
    }
  }

  at(daysAgo: number, hour: number): void {
    this.time = Math.max(this.time + 1000, this.today.getTime() - daysAgo * DAY_MS - (daysAgo < 1 ? 0 : (this.today.getTime() % DAY_MS) - hour * 3_600_000))
  }

  receive(lot: DemoLot, serialsListed: boolean): string {
    this.at(lot.daysAgo, 7.2)
    const resubmissionOf = lot.resubmissionOf ? this.services.db.select({ number: lots.number }).from(lots).where(eq(lots.supplierLot, lot.resubmissionOf)).get()?.number ?? null : null
    return receiveLot(this.as('ines@kestrelfold.example'), {
      supplierCode: lot.supplier, partNumber: lot.part, supplierLot: lot.supplierLot, quantity: lot.quantity, orderNumber: `PO-${7000 + (lot.quantity * 7 + lot.supplierLot.length) % 900}`, unitPrice: null, remarks: '',
      serials: serialsListed ? Array.from({ length: lot.quantity }, (_, index) => serialOf(lot, index + 1)) : [], resubmissionOf,
    }).number
  }
}

async function seedPeopleAndParts(stage: Stage): Promise<void> {
  const { db, passwords } = stage.services
  const passwordHash = await passwords.hash(DEMO_PASSWORD)
  const createdAt = new Date(stage.time).toISOString()
  const supplierIds = new Map(SUPPLIERS.map(row => [row.code as string, db.insert(suppliers).values({ ...row, createdAt }).returning().get().id]))
  for (const { supplier, ...person } of PEOPLE) {
    const row = db.insert(people).values({ ...person, supplierId: supplier ? supplierIds.get(supplier)! : null, passwordHash, createdAt }).returning().get()
    stage.addActor(row.email, { personId: row.id, name: row.name, role: row.role, supplierId: row.supplierId })
  }
  const author = stage.as('mara@kestrelfold.example').actor.personId
  const approver = stage.as('jonas@kestrelfold.example').actor.personId
  const daysAgo = (days: number) => new Date(stage.today.getTime() - days * DAY_MS).toISOString()
  for (const demo of RIGS) {
    const rig = db.insert(rigs).values({ code: demo.code, name: demo.name, method: demo.method, location: demo.location, properties: demo.properties, createdAt }).returning().get()
    for (const row of demo.calibrations) {
      db.insert(calibrations).values({
        rigId: rig.id, certificateNumber: row.certificateNumber, laboratory: 'Harrow Hill Calibration (invented)', performedOn: daysAgo(row.daysAgo).slice(0, 10), dueOn: daysAgo(row.daysAgo - Math.round(row.months * 30.44)).slice(0, 10),
        torqueRelativeUncertainty: demo.properties.torqueRelativeUncertainty, torqueAbsoluteUncertaintyNm: demo.properties.torqueAbsoluteUncertaintyNm, enteredById: author, enteredAt: daysAgo(row.daysAgo - 3),
      }).run()
    }
  }
  for (const demo of PARTS) {
    const part = db.insert(parts).values({ number: demo.number, name: demo.name, revision: demo.revision, design: demo.design, ratedTorqueNm: demo.ratedTorqueNm, createdAt }).returning().get()
    for (const row of demo.suppliers) db.insert(partSuppliers).values({ partId: part.id, supplierId: supplierIds.get(row.code)!, supplierPartNumber: row.supplierPartNumber, unitPrice: row.unitPrice }).run()
    demo.sheets.forEach((sheet, index) => db.insert(limitSheets).values({
      partId: part.id, version: index + 1, state: 'approved', content: sheet.content, reason: sheet.reason, authorId: author, createdAt: daysAgo(sheet.daysAgo + 5), submittedAt: daysAgo(sheet.daysAgo + 4),
      approvedById: approver, approvedAt: daysAgo(sheet.daysAgo), approvalReason: 'Agreed with the joint team', effectiveFrom: daysAgo(sheet.daysAgo),
    }).run())
  }
}

/** One past lot from receipt to its end. */
async function playLot(stage: Stage, lot: DemoLot): Promise<void> {
  const number = stage.receive(lot, true)
  stage.at(lot.daysAgo, 9.5)
  const inspector = stage.as(lot.quantity % 3 === 0 ? 'tobin@kestrelfold.example' : 'ines@kestrelfold.example')
  const drawn = inspector.db.select().from(samples).where(eq(samples.lotId, getLot(inspector, number).id)).all()
  for (let from = 0; from < drawn.length; from += AT_ONCE) {
    await Promise.all(drawn.slice(from, from + AT_ONCE).map((sample) => {
      const file = sampleFile(lot, sample.position)
      return recordUpload(inspector, { lotNumber: number, name: file.name, rigCode: sample.drawOrder % 2 === 0 ? 'TR-1' : 'TR-2', bytes: file.bytes, reason: '' })
    }))
    stage.time += 6 * 60_000
  }
  const evidence = gatherEvidence(inspector.db, getLot(inspector, number))
  if (evidence.lotVerdict.outcome === 'open') throw new Error(`The demo lot ${lot.supplierLot} cannot be decided: ${evidence.lotVerdict.sentence}`)
  const outcome = evidence.lotVerdict.outcome === 'accept' ? 'accepted' : 'rejected'
  await decideLot(inspector, number, { password: DEMO_PASSWORD, outcome, evidenceHash: evidence.hash, reason: '' })
  if (outcome === 'rejected') playReturn(stage, lot, number)
}

/** What followed a rejection: notice, acknowledgement, answer, disposition, and the closing when it is long ago. */
function playReturn(stage: Stage, lot: DemoLot, number: string): void {
  const { db } = stage.services
  const found = db.select({ id: nonconformances.id, number: nonconformances.number }).from(nonconformances).innerJoin(lots, eq(lots.id, nonconformances.lotId)).where(eq(lots.number, number)).get()!
  stage.deliverMail(found.id)
  const contact = PEOPLE.find(person => person.supplier === lot.supplier)!.email
  const engineer = 'mara@kestrelfold.example'
  const steps: [number, number, () => Promise<void> | void][] = [
    [2, 10, () => void acknowledgeNonconformance(stage.as(contact), found.number)],
    [4, 11, () => decideDisposition(stage.as(engineer), found.number, { disposition: lot.disposition ?? 'return-to-supplier', reason: 'Agreed with purchasing', password: DEMO_PASSWORD })],
    [8, 15, () => answerNonconformance(stage.as(contact), found.number, ANSWERS[lot.story ?? ''] ?? ANSWERS['']!)],
    [12, 14, () => reviewAnswer(stage.as(engineer), found.number, { outcome: 'accepted', reason: 'Plausible; we watch the next three lots' })],
    [50, 14, () => closeNonconformance(stage.as(engineer), found.number, 'Verified on the next lots')],
  ]
  // What is recent stays open, so that there is something to do.
  const played = lot.daysAgo < 25 ? 0 : lot.daysAgo < 60 ? 3 : steps.length
  for (const [days, hour, act] of steps.slice(0, played)) if (lot.daysAgo - days > 0.5) stage.later(lot.daysAgo - days, hour, act)
}

const ANSWERS: Record<string, SupplierAnswer> = {
  '': { containment: 'Stock and goods in transit were stopped and measured.', cause: 'A worn fixture let parts sit off their place.', correctiveAction: 'The fixture was replaced and is measured weekly.', preventiveAction: '' },
  'improves after corrective action': { containment: 'All stators of the same coil of sheet were taken out of stock.', cause: 'The stamping tool had worn on one side, so that slot openings differed.', correctiveAction: 'The tool was reground; slot openings are measured on every coil.', preventiveAction: 'Tool life is limited to 200 000 strokes.' },
  'stator stamping changed': { containment: 'Deliveries wait until each lot is measured here.', cause: 'A new stamping tool with wider tolerance on the slot opening.', correctiveAction: 'The tool maker corrects two dies.', preventiveAction: 'A first-article map goes to the buyer when a tool changes.' },
}
