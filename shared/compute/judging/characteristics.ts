import type { CharacteristicUnit } from '../terms/measurement'

export type CharacteristicKind = 'torque' | 'ratio' | 'angle'

/** What is known of a characteristic before it is measured. */
export interface CharacteristicDescription {
  key: string
  /** Name for people: "Cogging, peak to peak". */
  label: string
  /** Unit of the stored figure and of its limits. */
  unit: CharacteristicUnit
  kind: CharacteristicKind
  /** Side that a limit usually bounds; null: shown, usually not limited. */
  limitedSide: 'upper' | 'lower' | 'both' | null
  /** Unit in which limits are usually typed and shown. */
  displayUnit: 'mN·m' | '%' | '' | '°'
  /** Significant digits shown. */
  digits: 3
}

type Entry = readonly [label: string, unit: CharacteristicUnit, side: CharacteristicDescription['limitedSide']]

const KNOWN: Readonly<Record<string, Entry>> = {
  'cogging.peakToPeak': ['Cogging, peak to peak', 'N·m', 'upper'],
  'cogging.rms': ['Cogging, RMS', 'N·m', 'upper'],
  'cogging.peakToPeak.raw': ['Cogging, peak to peak of the raw points', 'N·m', null],
  'detent.peak': ['Detent torque, peak', 'N·m', 'both'],
  'rippleRatio': ['Ripple ratio', '%', 'upper'],
  'friction.mean': ['Friction, mean', 'N·m', 'upper'],
  'friction.peakToPeak': ['Friction, peak to peak', 'N·m', 'upper'],
  'group.design': ['Design order, RMS', 'N·m', 'upper'],
  'group.rotorSide': ['Rotor side, RMS', 'N·m', 'upper'],
  'group.statorSide': ['Stator side, RMS', 'N·m', 'upper'],
  'group.turn': ['Once or twice per turn, RMS', 'N·m', 'upper'],
  'group.other': ['Other orders, RMS', 'N·m', 'upper'],
  'harmonicContent': ['Harmonic content', '1', 'upper'],
  'repeatability': ['Repeatability, turn to turn', 'N·m', 'upper'],
  'afterCompensation.peakToPeak': ['Peak to peak after compensation', 'N·m', 'upper'],
  'afterCompensation.reduction': ['Reduction by compensation', '%', 'lower'],
  'referenceMatch': ['Match with the reference map', '1', 'lower'],
  'referenceShift': ['Angle to the reference map', 'rad', null],
  'angleSensorEccentricity': ['Eccentricity of the angle sensor', 'rad', null],
}

const ORDER_KEY = /^order\.([1-9]\d{0,3})(\.ofRated|\.ofDesign)?$/
const RIPPLE_KEY = /^rippleRatio\.([A-Za-z]+)$/

/** The ripple ratio's definitions in words; `rippleRatio` itself is the one that the sheet names. */
const RIPPLE_WORDS: Readonly<Record<string, string>> = {
  peakToPeakOverRated: 'peak to peak ÷ rated', halfPeakToPeakOverRated: 'half peak to peak ÷ rated', rmsOverRated: 'RMS ÷ rated', peakToPeakOverMean: 'peak to peak ÷ mean',
  halfPeakToPeakOverMean: 'half peak to peak ÷ mean', maxMinusMinOverMaxPlusMin: '(max − min) ÷ (max + min)', largestDeviationOverMean: 'largest deviation ÷ mean', rmsOverMean: 'RMS ÷ mean',
}

/** The fixed characteristic keys in the order in which they are shown; `order.K`, `order.K.ofRated`, `order.K.ofDesign` and `rippleRatio.DEFINITION` come on top of them. */
export const CHARACTERISTIC_KEYS: readonly string[] = Object.keys(KNOWN)

/**
 * Whether a text is the key of a characteristic: one of `CHARACTERISTIC_KEYS`, `order.K` (K from 1 to 9999) with or without a share, or a ripple ratio by name.
 *
 * @param key any text
 * @returns true when it is
 */
export function isCharacteristicKey(key: string): boolean {
  return Object.hasOwn(KNOWN, key) || ORDER_KEY.test(key) || Object.hasOwn(RIPPLE_WORDS, RIPPLE_KEY.exec(key)?.[1] ?? '')
}

const KINDS: Readonly<Record<CharacteristicUnit, CharacteristicKind>> = { 'N·m': 'torque', '%': 'ratio', '1': 'ratio', 'rad': 'angle' }
const DISPLAY_UNITS = { 'N·m': 'mN·m', '%': '%', '1': '', 'rad': '°' } as const

function entryOf(key: string): Entry | undefined {
  const order = ORDER_KEY.exec(key)
  if (order?.[2]) return [`Order ${order[1]}, of the ${order[2] === '.ofRated' ? 'rated torque' : 'design order'}`, '%', 'upper']
  if (order) return [`Order ${order[1]}`, 'N·m', 'upper']
  const ripple = RIPPLE_WORDS[RIPPLE_KEY.exec(key)?.[1] ?? '']
  if (ripple) return [`Ripple ratio, ${ripple}`, '%', 'upper']
  return Object.hasOwn(KNOWN, key) ? KNOWN[key] : undefined
}

/**
 * Name, unit and usual limits of a characteristic.
 *
 * @param key characteristic key
 * @returns its description
 * @throws RangeError when the key is not known
 */
export function describeCharacteristic(key: string): CharacteristicDescription {
  const entry = entryOf(key)
  if (!entry) {
    throw new RangeError(`describeCharacteristic: key must be order.K or one of ${CHARACTERISTIC_KEYS.join(', ')}, got ${key}`)
  }
  const [label, unit, limitedSide] = entry
  return { key, label, unit, kind: KINDS[unit], limitedSide, displayUnit: DISPLAY_UNITS[unit], digits: 3 }
}
