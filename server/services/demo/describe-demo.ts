import type { DemoResponse } from '#shared/contracts/session'
import { labelOf, lotsToday, serialOf } from '../../database/seed/scenario/lots'
import { DEMO_PASSWORD, PEOPLE } from '../../database/seed/scenario/people'
import { demoDay } from '../../database/seed/seed-demo'
import type { Services } from '../context'
import { DomainError } from '../domain-error'

/** The demo's accounts and the labels to scan; outside a demo there is no such thing. */
export function describeDemo(services: Pick<Services, 'db' | 'settings'>): DemoResponse {
  if (!services.settings.demo) throw new DomainError('not-found', 'This is not a demo.')
  return {
    accounts: PEOPLE.filter(person => person.noticeRank !== 2).map(({ name, role, email }) => ({ name, role, email, password: DEMO_PASSWORD })),
    labels: lotsToday(demoDay(services)).map((lot, index) => ({ title: lot.title, text: labelOf(lot, `PO-${7801 + index}`), packingList: `/api/demo/packing-lists/${lot.supplierLot}` })),
  }
}

/** Demo only: the serial numbers of a delivery, one a line. */
export function getPackingList(services: Pick<Services, 'db' | 'settings'>, supplierLot: string): { name: string; bytes: Uint8Array } {
  const lot = services.settings.demo ? lotsToday(demoDay(services)).find(each => each.supplierLot === supplierLot) : undefined
  if (!lot) throw new DomainError('not-found', 'There is no such packing list.')
  const lines = Array.from({ length: lot.quantity }, (_, index) => serialOf(lot, index + 1))
  return { name: `${supplierLot}-serials.txt`, bytes: new TextEncoder().encode(`${lines.join('\n')}\n`) }
}
