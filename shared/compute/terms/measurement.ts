import type { MotorDesign, OrderOrigin } from './motor'

export type Method = 'torque-sensor' | 'hold' | 'spin'

/** +1 while the angle rises, −1 while it falls. */
export type Direction = 1 | -1

/** What a column of a measurement file can hold. */
export type ColumnRole =
  | 'angle' | 'torque' | 'current' | 'voltage' | 'duty' | 'bus' | 'time' | 'speed' | 'direction' | 'temperature'

/** Which column of a rig's files is what, in which unit. */
export interface ColumnRecipe {
  /** Counts up with every confirmed change; 0 while only guessed. */
  version: number
  columns: RecipeColumn[]
}

export interface RecipeColumn {
  role: ColumnRole
  /** Header text as it stands in the file; null when the files have no header. */
  header: string | null
  /** Zero-based place in the row, used when there is no header. */
  index: number
  /** Unit as in the unit table (`deg`, `counts/8192`, `mN·m`, …); '' for the direction column; null when it has yet to be asked. */
  unit: string | null
}

/** A reason for which a file cannot be judged. */
export interface Fault {
  code: string
  /** Line of the file, counted from 1; null when the whole file is meant. */
  line: number | null
  /** What is wrong, one sentence. */
  sentence: string
  /** What to do, one sentence. */
  remedy: string
}

/** A doubt that does not stop the judgement; reaches the Motor page and the paper. */
export interface Warning {
  code: string
  sentence: string
}

/** Ripple ratio definitions; the "OverMean" forms are for maps under load only. */
export type RippleDefinition =
  | 'peakToPeakOverRated' | 'halfPeakToPeakOverRated' | 'rmsOverRated'
  | 'peakToPeakOverMean' | 'halfPeakToPeakOverMean' | 'maxMinusMinOverMaxPlusMin' | 'largestDeviationOverMean' | 'rmsOverMean'

/** What a rig's calibration and data sheet say, as far as uncertainty depends on it. */
export interface RigProperties {
  /** Largest torque the sensor may see, N·m; null: not stated. */
  rangeNm: number | null
  /** Smallest step of the torque reading, N·m. */
  torqueResolutionNm: number
  /** Standard uncertainty of the torque scale, relative (1 = 100 %). */
  torqueRelativeUncertainty: number
  /** Standard uncertainty of torque independent of its size, N·m. */
  torqueAbsoluteUncertaintyNm: number
  /** Smallest step of the angle reading, rad. */
  angleResolutionRad: number
  /** First-order bandwidth of the torque channel, Hz; null: not stated. */
  bandwidthHz: number | null
}

/** Compensation by a feed-forward table in a drive. */
export interface CompensationSettings {
  /** Entries per turn, linear interpolation between them. */
  entries: number
  /** Smallest torque step of the drive, N·m. */
  stepNm: number
}

/** Everything outside the file that its figures depend on. */
export interface AnalysisSettings {
  method: Method
  design: MotorDesign
  /** N·m; null when the part states none. */
  ratedTorqueNm: number | null
  /** Highest order to fit; null: 3 × design order and at least 64. */
  highestOrder: number | null
  /** Orders that a limit names; the sampling must support them. */
  ordersNamed: number[]
  rippleDefinition: RippleDefinition
  compensation: CompensationSettings | null
  recipe: ColumnRecipe | null
  rig: RigProperties | null
}

export type CharacteristicUnit = 'N·m' | '%' | '1' | 'rad'

/** One figure of a motor. */
export interface Characteristic {
  /** `cogging.peakToPeak`, `order.12`, `group.rotorSide`, … */
  key: string
  /** null: not computed, see `notStated`. */
  value: number | null
  unit: CharacteristicUnit
  /** Expanded uncertainty, k = 2, same unit; null when not stated. */
  expandedUncertainty: number | null
  /** Why there is no value, for people. */
  notStated?: string
}

/** One order of the fitted cogging torque, τ = A·cos(kθ + φ). */
export interface OrderAmplitude extends OrderOrigin {
  order: number
  /** Peak amplitude, N·m. */
  amplitudeNm: number
  /** Phase, degrees, −180 < φ ≤ 180. */
  phaseDeg: number
  /** Expanded uncertainty of the amplitude, N·m, k = 2. */
  expandedUncertaintyNm: number
  /** Above the noise floor by the stated test. */
  significant: boolean
}

/** Fourier coefficients of orders 1…K: value(θ) = mean + Σ cos[k−1]·cos kθ + sin[k−1]·sin kθ, N·m. */
export interface FourierSeries {
  meanNm: number
  cosNm: number[]
  sinNm: number[]
}

/** The figures of one measurement. */
export interface MapResult {
  engineVersion: string
  method: Method
  /** Rows read. */
  rows: number
  /** Whole turns measured, both directions together. */
  turns: number
  directions: 'both' | 'forward' | 'reverse'
  /** Highest order fitted. */
  highestOrder: number
  /** Mean of the even part: the transducer's zero, or the load. N·m */
  zeroNm: number
  /** Cogging torque (even part, mean removed: meanNm = 0). */
  cogging: FourierSeries
  /** Odd part (friction and hysteresis); null when one direction only. */
  friction: FourierSeries | null
  /** The significant orders, by order. */
  orders: OrderAmplitude[]
  characteristics: Characteristic[]
  warnings: Warning[]
  /** Recipe used, as guessed or given. */
  recipe: ColumnRecipe
}

/** What `analyse` gives: figures, or the fault for which there are none. */
export type AnalysisOutcome =
  | { ok: true; result: MapResult }
  /** `recipe`: the guess made so far, when a unit or a column has to be asked. */
  | { ok: false; fault: Fault; recipe?: ColumnRecipe }
