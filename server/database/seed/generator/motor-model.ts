import type { MotorDesign } from '#shared/compute/terms/motor'
import type { SeededRandom } from './random'

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
  /** Coulomb friction and hysteresis together, N·m. */
  frictionNm: number
}

export interface Harmonic { order: number; amplitudeNm: number; phaseRad: number }

/** A motor with exactly known torque τ(θ) = Σ A·cos(kθ + φ), the torque that must be applied from outside. */
export interface ModelMotor {
  harmonics: Harmonic[]
  frictionNm: number
  torqueNm: (angleRad: number) => number
  truth: () => { peakToPeakNm: number; rmsNm: number }
}

const TABLE = 8192

/**
 * Makes a motor from its specification.
 *
 * Brushless: every slot meets every magnet with the same edge torque g; the coefficient of order k is −i·g_k·S_k·M_k*, S_k = Σ s_i e^(−ikα_i) over the slots,
 * M_k = Σ m_j e^(−ikβ_j) over the poles. Identical parts leave multiples of lcm(Q, 2p) only; unequal magnets add multiples of Q, unequal slots multiples of
 * 2p. g_k = k^(−0.65)·e^(−2.04·k/L): chosen so that second harmonic and faults have usual sizes (common practice, no source).
 * Steppers: design order and its double, stack imbalance at the half (claw pole) or at one to three times the teeth (hybrid).
 *
 * Shares no code with the engine, so that it can be its truth.
 */
export function makeMotor(spec: MotorSpec, random: SeededRandom): ModelMotor {
  const raw = spec.design.kind === 'brushless' ? brushless(spec, spec.design, random) : stepper(spec, random)
  const largest = Math.max(...raw.map(row => row.amplitudeNm))
  const harmonics = raw.filter(row => row.amplitudeNm > 1e-6 * largest)
  const table = tabulate(harmonics)
  return {
    harmonics,
    frictionNm: spec.frictionNm * (1 + 0.06 * random.gaussian()),
    torqueNm: angle => interpolate(table, angle),
    truth: () => ({ peakToPeakNm: Math.max(...table) - Math.min(...table), rmsNm: Math.sqrt(harmonics.reduce((sum, row) => sum + row.amplitudeNm ** 2 / 2, 0)) }),
  }
}

function greatestDivisor(a: number, b: number): number {
  return b === 0 ? a : greatestDivisor(b, a % b)
}

function brushless(spec: MotorSpec, design: { slots: number; poles: number }, random: SeededRandom): Harmonic[] {
  const { slots, poles } = design
  const period = slots * poles / greatestDivisor(slots, poles)
  const edge = (order: number) => order ** -0.65 * Math.exp(-2.04 * order / period)
  const slotRing = ringOf(slots, spec.statorScatter, spec.wideSlot ?? 0, random)
  const poleRing = ringOf(poles, spec.rotorScatter, -(spec.weakMagnet ?? 0), random)
  const scale = spec.designPeakToPeakNm / peakOfDesign(period, order => edge(order) * slots * poles)
  return Array.from({ length: 2 * period }, (_, index) => {
    const order = index + 1
    const s = sumOver(slotRing, order)
    const m = sumOver(poleRing, order)
    const re = s.re * m.re + s.im * m.im
    const im = s.im * m.re - s.re * m.im
    // times −i: cos phase −90° for a perfect motor.
    return { order, amplitudeNm: scale * edge(order) * Math.hypot(re, im), phaseRad: Math.atan2(-re, im) }
  })
}

interface RingPart { strength: number; angle: number }

function ringOf(count: number, scatter: number, oddOne: number, random: SeededRandom): RingPart[] {
  const odd = random.integer(count)
  return Array.from({ length: count }, (_, index) => ({
    strength: 1 + scatter * random.gaussian() + (index === odd ? oddOne : 0),
    angle: 2 * Math.PI * index / count + scatter * 0.02 * random.gaussian(),
  }))
}

function sumOver(ring: RingPart[], order: number): { re: number; im: number } {
  let re = 0
  let im = 0
  for (const part of ring) {
    re += part.strength * Math.cos(order * part.angle)
    im -= part.strength * Math.sin(order * part.angle)
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

function tabulate(harmonics: readonly Harmonic[]): Float64Array {
  const table = new Float64Array(TABLE)
  const cosines = Float64Array.from({ length: TABLE }, (_, index) => Math.cos(2 * Math.PI * index / TABLE))
  for (const { order, amplitudeNm, phaseRad } of harmonics) {
    const a = amplitudeNm * Math.cos(phaseRad)
    const b = -amplitudeNm * Math.sin(phaseRad)
    for (let index = 0, at = 0; index < TABLE; index++, at = (at + order) % TABLE) {
      table[index]! += a * cosines[at]! + b * cosines[(at + TABLE - TABLE / 4) % TABLE]!
    }
  }
  return table
}

/** Cubic (Catmull–Rom) between table points: at order 528 the error stays below 1e-4 of that order's amplitude, far under any noise used. */
function interpolate(table: Float64Array, angle: number): number {
  const turns = angle / (2 * Math.PI)
  const place = (turns - Math.floor(turns)) * TABLE
  const at = Math.floor(place)
  const t = place - at
  const p0 = table[(at + TABLE - 1) % TABLE]!
  const p1 = table[at % TABLE]!
  const p2 = table[(at + 1) % TABLE]!
  const p3 = table[(at + 2) % TABLE]!
  return p1 + 0.5 * t * (p2 - p0 + t * (2 * p0 - 5 * p1 + 4 * p2 - p3 + t * (3 * (p1 - p2) + p3 - p0)))
}
