import type { MotorDesign } from '#shared/compute/terms/motor'
import type { SeededRandom } from './random'
import { interpolate, tabulate } from './waveform'

/** How a motor was made: its design and what went wrong with it. Scatter is the relative standard deviation from part to part within the motor. */
export interface MotorSpec {
  design: MotorDesign
  /** Peak to peak of a perfect motor of this design, N·m. */
  designPeakToPeakNm: number
  /** Magnets (or rotor stacks): strength and place. */
  rotorScatter: number
  /** Slots or stator poles: openings and teeth. */
  statorScatter: number
  /** One weak magnet, relative loss of strength; 0: none. */
  weakMagnet?: number
  /** One wide slot, relative excess; 0: none. */
  wideSlot?: number
  /** Oval stator bore: openings vary by this share, twice a turn; 0: round. */
  ovality?: number
  /** Rotor that sits off the bore's centre (static eccentricity), offset as a share of the air gap, below 1; 0: none. */
  staticEccentricity?: number
  /** Rotor that runs out about its own shaft (dynamic eccentricity), offset as a share of the air gap, below 1; 0: none. */
  dynamicEccentricity?: number
  /** Coulomb friction, the same at every angle, N·m. */
  frictionNm: number
  /** Mean of what the core's hysteresis adds to friction, N·m; it breathes with the design order. 0: none. */
  hysteresisNm?: number
}

export interface Harmonic { order: number; amplitudeNm: number; phaseRad: number }

/** A motor with exactly known torque τ(θ) = Σ A·cos(kθ + φ), the torque that must be applied from outside. */
export interface ModelMotor {
  harmonics: Harmonic[]
  /** Coulomb friction and hysteresis together, mean over the turn, N·m. */
  frictionNm: number
  torqueNm: (angleRad: number) => number
  /** What resists the turning at an angle, N·m; its sign follows the direction. */
  resistanceNm: (angleRad: number) => number
  truth: () => { peakToPeakNm: number; rmsNm: number; harmonics: readonly Harmonic[] }
}

/** Share of the hysteresis torque that follows the design order (common practice, no source). */
const BREATHING = 0.2

/**
 * Makes a motor from its specification.
 *
 * @throws RangeError when an eccentricity is not from 0 to below 1
 *
 * Brushless: every slot meets every magnet with the same edge torque g; the coefficient of order k is −i·g_k·S_k·M_k*, S_k = Σ s_i e^(−ikα_i) over the slots,
 * M_k = Σ m_j e^(−ikβ_j) over the poles. Identical parts leave multiples of lcm(Q, 2p) only; unequal magnets add multiples of Q, unequal slots multiples of
 * 2p. g_k = k^(−0.65)·e^(−2.04·k/L): chosen so that second harmonic and faults have usual sizes (common practice, no source).
 * An offset ε of the air gap weighs slots (static) or poles (dynamic) with 1/(1 − ε·cos α)², as the energy goes with the square of the flux density; both
 * at once are multiplied, which is right to first order in ε. Steppers are made without eccentricity.
 * Steppers: design order and its double, stack imbalance at the half (claw pole) or at one to three times the teeth (hybrid).
 *
 * Shares no code with the engine, so that it can be its truth.
 */
export function makeMotor(spec: MotorSpec, random: SeededRandom): ModelMotor {
  const raw = spec.design.kind === 'brushless' ? brushless(spec, spec.design, random) : stepper(spec, random)
  const largest = Math.max(...raw.map(row => row.amplitudeNm))
  const harmonics = raw.filter(row => row.amplitudeNm > 1e-6 * largest)
  const table = tabulate(harmonics)
  const coulomb = spec.frictionNm * (1 + 0.06 * random.gaussian())
  const hysteresis = spec.hysteresisNm ?? 0
  const order = designOrder(spec.design)
  return {
    harmonics,
    frictionNm: coulomb + hysteresis,
    torqueNm: angle => interpolate(table, angle),
    resistanceNm: angle => coulomb + hysteresis * (1 + (hysteresis === 0 ? 0 : BREATHING * Math.cos(order * angle))),
    truth: () => ({ peakToPeakNm: spanOf(table), rmsNm: Math.sqrt(harmonics.reduce((sum, row) => sum + row.amplitudeNm ** 2 / 2, 0)), harmonics }),
  }
}

/** Peak to peak, each peak taken at the vertex of the parabola through its three points: right to 4e-5 at order 528 and 3e-6 at order 264, where the points alone underread by up to 5e-3 and 1.3e-3. */
function spanOf(table: Float64Array): number {
  let [least, most] = [Infinity, -Infinity]
  let before = table[table.length - 1]!
  let here = table[0]!
  for (let at = 1; at <= table.length; at++) {
    const after = at === table.length ? table[0]! : table[at]!
    if ((here - before) * (here - after) >= 0) {
      const bend = 2 * here - before - after
      const vertex = bend === 0 ? here : here + (after - before) ** 2 / (8 * bend)
      if (vertex < least) least = vertex
      if (vertex > most) most = vertex
    }
    before = here
    here = after
  }
  return most - least
}

function designOrder(design: MotorDesign): number {
  if (design.kind === 'brushless') return leastMultiple(design.slots, design.poles)
  return 4 * (design.kind === 'claw-pole stepper' ? design.polePairs : design.rotorTeeth)
}

function leastMultiple(a: number, b: number): number {
  return a * b / greatestDivisor(a, b)
}

function greatestDivisor(a: number, b: number): number {
  return b === 0 ? a : greatestDivisor(b, a % b)
}

function brushless(spec: MotorSpec, design: { slots: number; poles: number }, random: SeededRandom): Harmonic[] {
  const { slots, poles } = design
  const period = leastMultiple(slots, poles)
  const edge = (order: number) => order ** -0.65 * Math.exp(-2.04 * order / period)
  const slotRing = ringOf(slots, { scatter: spec.statorScatter, oddOne: spec.wideSlot ?? 0, ovality: spec.ovality ?? 0, eccentricity: spec.staticEccentricity ?? 0 }, random)
  const poleRing = ringOf(poles, { scatter: spec.rotorScatter, oddOne: -(spec.weakMagnet ?? 0), ovality: 0, eccentricity: spec.dynamicEccentricity ?? 0 }, random)
  const scale = spec.designPeakToPeakNm / peakOfDesign(period, order => edge(order) * slots * poles)
  const [s, m] = [sumsOver(slotRing, 2 * period), sumsOver(poleRing, 2 * period)]
  return Array.from({ length: 2 * period }, (_, index) => {
    const order = index + 1
    const re = s.re[order]! * m.re[order]! + s.im[order]! * m.im[order]!
    const im = s.im[order]! * m.re[order]! - s.re[order]! * m.im[order]!
    // times −i: cos phase −90° for a perfect motor.
    return { order, amplitudeNm: scale * edge(order) * Math.hypot(re, im), phaseRad: Math.atan2(-re, im) }
  })
}

interface RingPart { strength: number; angle: number }

interface RingFaults { scatter: number; oddOne: number; ovality: number; eccentricity: number }

function ringOf(count: number, { scatter, oddOne, ovality, eccentricity }: RingFaults, random: SeededRandom): RingPart[] {
  if (!(eccentricity >= 0 && eccentricity < 1)) throw new RangeError(`makeMotor: eccentricity must be from 0 to below 1, not ${eccentricity}`)
  const odd = random.integer(count)
  return Array.from({ length: count }, (_, index) => ({
    strength: (1 + scatter * random.gaussian() + (index === odd ? oddOne : 0) + ovality * Math.cos(4 * Math.PI * index / count)) / (1 - eccentricity * Math.cos(2 * Math.PI * index / count)) ** 2,
    angle: 2 * Math.PI * index / count + scatter * 0.02 * random.gaussian(),
  }))
}

/** Σ strength·e^(−ik·angle) for the orders k = 0…highest; each part's phasor is turned step by step, which is right to 1e-12 over a thousand orders. */
function sumsOver(ring: RingPart[], highest: number): { re: Float64Array; im: Float64Array } {
  const re = new Float64Array(highest + 1)
  const im = new Float64Array(highest + 1)
  for (const { strength, angle } of ring) {
    const [cosine, sine] = [Math.cos(angle), Math.sin(angle)]
    let [x, y] = [strength, 0]
    for (let order = 0; order <= highest; order++) {
      re[order]! += x
      im[order]! += y
      ;[x, y] = [x * cosine + y * sine, y * cosine - x * sine]
    }
  }
  return { re, im }
}

/** Peak to peak of the perfect motor: multiples of the design order, all at −90°. */
function peakOfDesign(period: number, amplitude: (order: number) => number): number {
  const at = (x: number) => amplitude(period) * Math.sin(x) + amplitude(2 * period) * Math.sin(2 * x)
  let most = 0
  for (let i = 0; i < 2000; i++) most = Math.max(most, at(2 * Math.PI * i / 2000))
  return 2 * most
}

function stepper(spec: MotorSpec, random: SeededRandom): Harmonic[] {
  const { design } = spec
  if (design.kind === 'brushless') throw new RangeError('stepper: design must be a stepper')
  const unit = design.kind === 'claw-pole stepper' ? design.polePairs : design.rotorTeeth
  const main = spec.designPeakToPeakNm / 2 / 1.02
  const spread = (share: number) => main * share * Math.abs(random.gaussian())
  const phase = () => 2 * Math.PI * random.uniform()
  const rows: Harmonic[] = [
    { order: 4 * unit, amplitudeNm: main, phaseRad: -Math.PI / 2 },
    { order: 8 * unit, amplitudeNm: main * 0.11, phaseRad: -Math.PI / 2 },
    { order: 2 * unit, amplitudeNm: spread(2 * spec.statorScatter), phaseRad: phase() },
    { order: unit, amplitudeNm: spread(spec.rotorScatter), phaseRad: phase() },
    { order: 3 * unit, amplitudeNm: spread(0.6 * spec.rotorScatter), phaseRad: phase() },
    { order: 1, amplitudeNm: spread(0.2 * spec.rotorScatter), phaseRad: phase() },
  ]
  return rows.filter(row => row.amplitudeNm > 0)
}
