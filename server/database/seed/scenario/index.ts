import { lotsToday, pastLots } from './lots'
import type { DemoLot, WaitingLot } from './lots'
import { PARTS } from './parts'
import type { DemoPart } from './parts'
import { DEMO_PASSWORD, PEOPLE, SUPPLIERS } from './people'
import type { DemoPerson } from './people'
import { RIGS } from './rigs'
import type { DemoRig } from './rigs'

export interface Scenario {
  password: string
  people: readonly DemoPerson[]
  suppliers: typeof SUPPLIERS
  parts: readonly DemoPart[]
  rigs: readonly DemoRig[]
  /** Oldest first. */
  past: DemoLot[]
  today: WaitingLot[]
}

/** The whole invented world of the demo, dated back from a day; the small size has a handful of past lots with one rejection. */
export function scenario(today: Date, size: 'small' | 'full'): Scenario {
  return { password: DEMO_PASSWORD, people: PEOPLE, suppliers: SUPPLIERS, parts: PARTS, rigs: RIGS, past: pastLots(today, size), today: lotsToday(today) }
}
