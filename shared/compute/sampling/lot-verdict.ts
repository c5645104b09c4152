import type { LotVerdict, MotorVerdict, NonconformityClass, SamplingPlan } from '../terms/judgement'
import { formatCount, joinWords, NONCONFORMITY_CLASSES } from './wording'

type ClassRow = SamplingPlan['classes'][number]
type ClassOutcome = LotVerdict['classes'][number]
type Motors = readonly (MotorVerdict | null)[]

/** A motor that is nonconforming in the class is judged in it, even when another limit of the class cannot be judged. */
function isJudgedIn(motor: MotorVerdict | null | undefined, name: NonconformityClass): boolean {
  if (!motor) return false
  if (motor.nonconformingClasses.includes(name)) return true
  return motor.verdict !== null && motor.characteristics.every(each => each.class !== name || each.verdict !== null)
}

function judgeClass(row: ClassRow, motors: Motors): ClassOutcome & { judgedAll: boolean } {
  const sample = motors.slice(0, row.n)
  const nonconforming = sample.filter(motor => motor?.nonconformingClasses.includes(row.class)).length
  const judgedAll = sample.length === row.n && sample.every(motor => isJudgedIn(motor, row.class))
  const outcome = nonconforming >= row.re ? 'reject' : judgedAll ? 'accept' : 'open'
  return { class: row.class, nonconforming, ac: row.ac, re: row.re, outcome, judgedAll }
}

/** Classes that the plan does not name but in which a motor is nonconforming: accept on 0, over the whole sample. */
function classRows(plan: SamplingPlan, motors: Motors): ClassRow[] {
  const named = new Map(plan.classes.map(row => [row.class, row]))
  return NONCONFORMITY_CLASSES.flatMap((name) => {
    const row = named.get(name)
    if (row) return [row]
    const met = motors.some(motor => motor?.nonconformingClasses.includes(name))
    return met ? [{ class: name, aql: null, n: plan.n, ac: 0, re: 1 }] : []
  })
}

/**
 * The verdict on a lot from the verdicts on its sample.
 *
 * A class is judged over the first n of its row, in draw order; it rejects the lot as soon as it reaches its
 * rejection number. The lot is accepted only when every motor of the sample is judged and every class accepts. Motors that are
 * null, or whose verdict is null, count as not judged. A motor counts as nonconforming in its `nonconformingClasses`:
 * under the four-way rule these are the conditional fails and fails; a conditional pass conforms. Between Ac and Re
 * (reduced inspection of MIL-STD-105E) the lot is accepted and the next one is inspected normally.
 *
 * @param request the plan, and the motors' verdicts in draw order, at most plan.n of them; missing ones are not judged
 * @returns outcome, counts by class, a sentence for people, and whether normal inspection returns
 * @throws RangeError when there are more motors than the plan draws
 * Source: MIL-STD-105E, 4.10.1.1 and 4.7.4; ISO 2859-1.
 */
export function judgeLot({ plan, motors }: { plan: SamplingPlan; motors: Motors }): LotVerdict {
  if (motors.length > plan.n) {
    throw new RangeError(`judgeLot: motors must be at most plan.n = ${plan.n}, got ${motors.length}`)
  }
  const judgedClasses = classRows(plan, motors).map(row => judgeClass(row, motors))
  const judged = motors.filter(motor => motor !== null && motor.verdict !== null).length
  const everyMotor = judged === plan.n
  const complete = everyMotor && judgedClasses.every(row => row.judgedAll)
  const rejected = judgedClasses.some(row => row.outcome === 'reject')
  const outcome = rejected ? 'reject' : complete ? 'accept' : 'open'
  const returnToNormal = outcome === 'accept' && judgedClasses.some(row => row.nonconforming > row.ac)
  const classes = judgedClasses.map(({ judgedAll: _, ...row }) => row)
  const verdict = { outcome, complete, judged, classes, returnToNormal } as const
  return { ...verdict, sentence: lotSentence(verdict, plan) }
}

function countPhrase(row: ClassOutcome, alone: boolean): string {
  const kind = alone ? '' : ` ${row.class}`
  return `${row.nonconforming}${kind} nonconforming (accept on ${row.ac}, reject on ${row.re})`
}

function lotSentence(verdict: Omit<LotVerdict, 'sentence'>, plan: SamplingPlan): string {
  const alone = verdict.classes.length === 1
    || verdict.classes.every(row => row.ac === 0 && row.re === 1 && row.nonconforming === 0)
  const relevant = verdict.outcome === 'reject' ? verdict.classes.filter(row => row.outcome === 'reject') : verdict.classes
  const shown = alone ? relevant.slice(0, 1) : relevant
  const counts = joinWords(shown.map(row => countPhrase(row, alone)))
  const motors = `${formatCount(verdict.judged)} of ${formatCount(plan.n)} motors judged`
  switch (verdict.outcome) {
    case 'open':
      return `Still open: ${motors}, ${counts}.`
    case 'accept':
      return `Accepted: ${motors}, ${counts}.`
        + (verdict.returnToNormal ? ' The count lies between the acceptance and the rejection number, so the next lot is inspected normally.' : '')
    case 'reject':
      return `Rejected${verdict.complete ? '' : ' before the sample was complete'}: ${motors}, ${counts}.`
  }
}
