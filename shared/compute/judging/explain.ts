import type { MotorVerdict } from '../terms/judgement'
import type { OrderAmplitude } from '../terms/measurement'
import type { Origin } from '../terms/motor'
import { isNonconforming } from './motor-verdict'

/** A motor of the sample as far as its explanation needs it. */
export interface ExplainedMotor {
  serial: string
  verdict: MotorVerdict
  /** Significant orders of its cogging torque. */
  orders: readonly OrderAmplitude[]
}

interface Finding { orders: number[]; origins: Origin[]; strongest: number }

/** Side and usual causes; "typical" and "or", because a map shows the side, not the culprit. */
const ORIGIN_WORDS: Readonly<Record<Origin, string>> = {
  design: 'the design order: typical of the magnetic circuit itself, such as magnet shape, skew or air gap',
  rotorSide: 'the rotor side: a weak or misplaced magnet',
  statorSide: 'the stator side: a slot opening, a tooth or the roundness of the stator',
  turn: 'once or twice per turn: fixture, coupling, bearing or an eccentric rotor',
  other: 'neither side alone: several small faults together, or the drive',
}
const SHORT_ORIGIN_WORDS: Readonly<Record<Origin, string>> = {
  design: 'the design itself', rotorSide: 'the rotor side', statorSide: 'the stator side', turn: 'fixture or bearing', other: 'several faults together or the drive',
}

/** Common practice, no source: an order stands out when it exceeds the usual by half as much as the most excessive one. */
const SHARE_OF_STRONGEST = 0.5
const MOST_ORDERS = 4
const MOST_FINDINGS = 2
/** Fewer conforming motors than these give no usual amplitude to compare with. */
const FEWEST_TO_COMPARE = 2

function median(values: number[]): number {
  const sorted = [...values].sort((a, b) => a - b)
  const middle = sorted.length >> 1
  return sorted.length % 2 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2
}

/** Usual amplitude of each order among the conforming motors; an order that is not significant there counts as 0. */
function usualAmplitudes(conforming: readonly ExplainedMotor[]): (order: number) => number {
  const maps = conforming.map(motor => new Map(motor.orders.map(each => [each.order, each.amplitudeNm])))
  return order => maps.length < FEWEST_TO_COMPARE ? 0 : median(maps.map(map => map.get(order) ?? 0))
}

function findingsOf(motor: ExplainedMotor, usual: (order: number) => number): Finding[] {
  const excess = motor.orders
    .filter(each => each.significant)
    .map(each => ({ ...each, excess: each.amplitudeNm - usual(each.order) }))
    .filter(each => each.excess > Math.max(0, each.expandedUncertaintyNm))
    .sort((a, b) => b.excess - a.excess)
  const strongest = excess[0]?.excess ?? 0
  const findings = new Map<string, Finding>()
  for (const each of excess.filter(order => order.excess >= SHARE_OF_STRONGEST * strongest).slice(0, MOST_ORDERS)) {
    const key = each.origins.join()
    const finding = findings.get(key) ?? { orders: [], origins: each.origins, strongest: each.excess }
    finding.orders.push(each.order)
    findings.set(key, finding)
  }
  return [...findings.values()].sort((a, b) => b.strongest - a.strongest).slice(0, MOST_FINDINGS)
}

function wordsFor({ orders, origins }: Finding): string {
  const sorted = [...orders].sort((a, b) => a - b)
  const subject = sorted.length === 1
    ? `order ${sorted[0]} stands out`
    : `orders ${sorted.slice(0, -1).join(', ')} and ${sorted.at(-1)} stand out`
  const [first, second] = origins
  if (!first) return `${subject}, of unknown origin`
  if (!second) return `${subject}, ${ORIGIN_WORDS[first]}`
  return `${subject}, either ${SHORT_ORIGIN_WORDS[first]} or ${SHORT_ORIGIN_WORDS[second]}: the map cannot tell which`
}

const isFriction = (key: string): boolean => key.startsWith('friction.')
const isReference = (key: string): boolean => key.startsWith('reference')

function explain(motor: ExplainedMotor, usual: (order: number) => number): string {
  const failing = motor.verdict.characteristics.filter(each => isNonconforming(each.verdict)).map(each => each.key)
  if (failing.length > 0 && failing.every(isFriction)) {
    return `${motor.serial}: only friction is beyond its limit; bearing, preload or hysteresis of the core, which the map cannot tell apart.`
  }
  if (failing.length > 0 && failing.every(key => key === 'repeatability')) {
    return `${motor.serial}: the turns differ from one another; look at the fixture and the rig before the motor.`
  }
  const findings = findingsOf(motor, usual)
  const friction = failing.some(isFriction) ? ' Friction is beyond its limit too.' : ''
  if (findings.length === 0) {
    const what = failing.length > 0 && failing.every(isReference) ? 'the map differs from the reference, but no order stands out' : 'no order stands out'
    return `${what}, so the map names no likely origin.${friction}`
  }
  return `${findings.map(wordsFor).join('; ')}.${friction}`
}

/**
 * Plain sentences about where the ripple of the nonconforming motors likely comes from, one for all motors of the same finding.
 *
 * An order stands out when its amplitude exceeds the median of the conforming motors of the same sample (0 with fewer than
 * two of them) by more than its own uncertainty and by at least half as much as the most excessive order. At most four
 * orders and two origins are named. What fits two origins is called "either"; nothing is claimed beyond the side.
 *
 * @param motors motors of the sample; conforming ones serve as comparison, amplitudes in N·m
 * @returns one sentence for each finding, with the serials that share it, in the given order
 * Source: attribution of orders as in OrderOrigin; the thresholds are common practice, no source.
 */
export function explainFailures(motors: readonly ExplainedMotor[]): string[] {
  const failing = motors.filter(motor => isNonconforming(motor.verdict.verdict))
  const usual = usualAmplitudes(motors.filter(motor => motor.verdict.verdict === 'pass' || motor.verdict.verdict === 'conditional-pass'))
  const bySentence = new Map<string, string[]>()
  for (const motor of failing) {
    const sentence = explain(motor, usual)
    bySentence.set(sentence, [...bySentence.get(sentence) ?? [], motor.serial])
  }
  return [...bySentence].map(([sentence, serials]) => `${joinSerials(serials)}: ${sentence}`)
}

/** "71-4452, 71-4515 and 71-4520". */
function joinSerials(serials: readonly string[]): string {
  return serials.length === 1 ? serials[0]! : `${serials.slice(0, -1).join(', ')} and ${serials.at(-1)}`
}
