import type { LotVerdict, SamplingPlan, Severity } from '../terms/judgement'
import { AQL_VALUES, tablePlan } from './tables'

/** What has happened to a supplier's part, in the order of the decisions. */
export type SwitchingEvent =
  | {
    kind: 'lot'
    /** Severity of the plan by which the lot was inspected. */
    severity: Severity
    accepted: boolean
    /** Submitted again after sorting or rework; does not count. */
    resubmitted: boolean
    /** Reduced inspection, count between Ac and Re: accepted, but normal inspection returns. */
    returnToNormal: boolean
    /** From `switchingPoints`. */
    points: SwitchingPoints
  }
  /** The engineer agrees to reduced inspection. */
  | { kind: 'reduced-agreed' }
  /** The engineer ends reduced inspection by hand: production irregular or delayed, or other conditions. */
  | { kind: 'normal-restored' }
  /** The engineer reopens a discontinued inspection. */
  | { kind: 'reopened' }

/** Points of one lot towards reduced inspection; 0 sets the switching score back to 0. */
export type SwitchingPoints = 0 | 2 | 3

/** Severity of the next lot and how it came about. */
export interface SwitchingState {
  severity: Severity
  /** Switching score under normal inspection, otherwise 0. */
  score: number
  /** Why the severity is what it is, one sentence. */
  reason: string
  /** Discontinued: no lot is inspected until the engineer reopens. */
  state: 'active' | 'discontinued'
  /** The score allows reduced inspection; the engineer has yet to agree. */
  reducedOffered: boolean
}

export const SCORE_FOR_REDUCED = 30
const WINDOW = 5
const REJECTED_FOR_TIGHTENED = 2
const ACCEPTED_FOR_NORMAL = 5
const REJECTED_FOR_DISCONTINUATION = 5

interface Memory extends SwitchingState {
  /** Results of the last lots under normal inspection, at most five. */
  recent: boolean[]
  /** Accepted in a row on tightened inspection. */
  acceptedInRow: number
  /** Rejected on tightened inspection since it began or was reopened. */
  rejectedOnTightened: number
}

type LotEvent = Extract<SwitchingEvent, { kind: 'lot' }>

const start = (severity: Severity, reason: string): Memory => ({
  severity, reason, score: 0, state: 'active', reducedOffered: false, recent: [], acceptedInRow: 0, rejectedOnTightened: 0,
})

/**
 * Points that a lot under normal inspection earns towards reduced inspection.
 *
 * A class with acceptance number 2 or more earns 3 when it would also have been accepted with the AQL one step tighter; one
 * with 0 or 1 earns 2 when accepted; otherwise 0. With several classes the lot earns the least of them. Classes without
 * AQL only have to be accepted.
 *
 * @param request the lot's plan and verdict
 * @returns 0, 2 or 3; 0 for a lot not accepted, not under normal inspection, or not sampled by attributes
 * @throws RangeError when the plan's classes are not from the tables
 * Source: ISO 2859-1:1999, 9.3.3.2 (from memory); the least over classes is the project's own choice.
 */
export function switchingPoints({ plan, verdict }: {
  plan: Pick<SamplingPlan, 'severity' | 'codeLetter' | 'classes'>
  verdict: Pick<LotVerdict, 'outcome' | 'classes'>
}): SwitchingPoints {
  if (verdict.outcome !== 'accept' || plan.severity !== 'normal' || plan.codeLetter === null) return 0
  let least: SwitchingPoints = 3
  for (const row of plan.classes) {
    if (row.aql === null) continue
    const count = verdict.classes.find(each => each.class === row.class)?.nonconforming ?? 0
    const points = row.ac < 2 ? 2 : count <= tighterAcceptanceNumber(plan.codeLetter, row.aql) ? 3 : 0
    if (points < least) least = points
  }
  return least
}

/** The plan may stand in another letter's row by an arrow; one step tighter is read in that row. */
function tighterAcceptanceNumber(letter: string, aql: string): number {
  const row = tablePlan('normal', letter, aql).letter
  const tighter = AQL_VALUES[(AQL_VALUES as readonly string[]).indexOf(aql) - 1]
  if (tighter === undefined) throw new RangeError(`switchingPoints: aql must have a tighter one in the table, got ${aql}`)
  return tablePlan('normal', row, tighter).ac
}

function afterNormal(memory: Memory, lot: LotEvent): Memory {
  const recent = [...memory.recent, lot.accepted].slice(-WINDOW)
  const rejected = recent.filter(accepted => !accepted).length
  if (rejected >= REJECTED_FOR_TIGHTENED) {
    return start('tightened', `Tightened: ${rejected} of the last ${recent.length} lots were rejected on normal inspection.`)
  }
  const score = lot.accepted && lot.severity === 'normal' && lot.points > 0 ? memory.score + lot.points : 0
  const reducedOffered = score >= SCORE_FOR_REDUCED
  const reason = reducedOffered
    ? `Normal: the switching score is ${score}, so reduced inspection is possible if the engineer agrees.`
    : memory.reason
  return { ...memory, recent, score, reducedOffered, reason: memory.reducedOffered && !reducedOffered ? 'Normal: the switching score was set back.' : reason }
}

function afterTightened(memory: Memory, lot: LotEvent): Memory {
  // Lots drawn before the switch say nothing about tightened inspection.
  if (lot.severity !== 'tightened') return memory
  const acceptedInRow = lot.accepted ? memory.acceptedInRow + 1 : 0
  if (acceptedInRow >= ACCEPTED_FOR_NORMAL) return start('normal', `Normal: ${ACCEPTED_FOR_NORMAL} lots in a row were accepted on tightened inspection.`)
  const rejectedOnTightened = memory.rejectedOnTightened + (lot.accepted ? 0 : 1)
  if (rejectedOnTightened < REJECTED_FOR_DISCONTINUATION) return { ...memory, acceptedInRow, rejectedOnTightened }
  const reason = `Inspection is discontinued: ${REJECTED_FOR_DISCONTINUATION} lots were rejected on tightened inspection. An engineer reopens it after the supplier has acted.`
  return { ...start('tightened', reason), state: 'discontinued' }
}

function afterReduced(memory: Memory, lot: LotEvent): Memory {
  if (!lot.accepted) return start('normal', 'Normal: a lot was rejected on reduced inspection.')
  if (lot.returnToNormal) return start('normal', 'Normal: a lot on reduced inspection lay between the acceptance and the rejection number.')
  return memory
}

function afterLot(memory: Memory, lot: LotEvent): Memory {
  if (lot.resubmitted || memory.state === 'discontinued') return memory
  if (memory.severity === 'normal') return afterNormal(memory, lot)
  return memory.severity === 'tightened' ? afterTightened(memory, lot) : afterReduced(memory, lot)
}

function after(memory: Memory, event: SwitchingEvent): Memory {
  switch (event.kind) {
    case 'lot':
      return afterLot(memory, event)
    case 'reduced-agreed':
      if (!memory.reducedOffered) throw new RangeError(`nextSeverity: reduced inspection may be agreed at a switching score of ${SCORE_FOR_REDUCED} or more on normal inspection, not on ${memory.severity} at ${memory.score}`)
      return start('reduced', `Reduced: the switching score reached ${memory.score} and the engineer agreed.`)
    case 'normal-restored':
      if (memory.severity !== 'reduced') throw new RangeError(`nextSeverity: normal inspection may be restored by hand from reduced inspection only, not from ${memory.severity}`)
      return start('normal', 'Normal: an engineer ended reduced inspection.')
    case 'reopened':
      if (memory.state !== 'discontinued') throw new RangeError('nextSeverity: only a discontinued inspection may be reopened')
      return start('tightened', 'Tightened: inspection was reopened after it had been discontinued.')
  }
}

/**
 * Severity of the next lot of a supplier's part.
 *
 * Normal → tightened when 2 of the last 5 or fewer lots are rejected; tightened → normal after 5 accepted in a row;
 * tightened → discontinued at the fifth rejected in all; normal → reduced at score 30 when the engineer agrees; reduced → normal
 * when a lot is rejected or lies between Ac and Re, or by hand. Each change starts counts and score anew. Resubmitted lots,
 * and lots decided while discontinued, do not count.
 *
 * @param history what has happened, oldest first; empty: normal inspection
 * @returns severity, score, reason and whether inspection goes on
 * @throws RangeError when the engineer's events do not fit the state in which they stand
 * Source: MIL-STD-105E, 4.7.1 to 4.8; ISO 2859-1:1999, 9.3 and 9.4 (score from memory).
 */
export function nextSeverity(history: readonly SwitchingEvent[]): SwitchingState {
  const memory = history.reduce(after, start('normal', 'Normal inspection, as every supplier’s part begins.'))
  const { severity, score, reason, state, reducedOffered } = memory
  return { severity, score, reason, state, reducedOffered }
}
