import type { CompensationSettings, FourierSeries } from '../terms/measurement'
import { evaluateSeries } from './evaluate'
import { gridValues } from './estimate'

const MOST_ENTRIES = 65_536
const FINER = 4

function checkSettings({ entries, stepNm }: CompensationSettings): void {
  if (!Number.isInteger(entries) || entries < 2 || entries > MOST_ENTRIES) throw new RangeError(`compensatedPeakToPeak: entries must be a whole number from 2 to ${MOST_ENTRIES}, not ${entries}`)
  if (!(stepNm >= 0) || !Number.isFinite(stepNm)) throw new RangeError(`compensatedPeakToPeak: stepNm must be a number from 0, not ${stepNm}`)
}

/**
 * Peak-to-peak torque that is left when a map is fed forward by a drive: of τ − q·round(interp(table)/q).
 *
 * The table holds τ at P equal steps, read by linear interpolation; q is the drive's smallest torque step. At every place where the drive's torque steps, the residual reaches half a
 * step on either side; these places are taken as such, so the result does not hang on the grid.
 *
 * @param cogging - the map, N·m
 * @param points - grid, a power of two, 16 a period of the highest order or more
 * @param compensation - entries P 2…65536 and step q ≥ 0 N·m (0: no steps)
 * @returns N·m
 * @throws RangeError when P or q is outside its domain
 */
export function compensatedPeakToPeak(cogging: FourierSeries, points: number, compensation: CompensationSettings): number {
  checkSettings(compensation)
  const { entries, stepNm } = compensation
  const size = FINER * points
  const [torque] = gridValues({ ...cogging, meanNm: 0 }, size)
  const table = evaluateSeries({ ...cogging, meanNm: 0 }, entries)
  let highest = -Infinity
  let lowest = Infinity
  const note = (value: number) => {
    if (value > highest) highest = value
    if (value < lowest) lowest = value
  }
  let before = { left: 0, step: NaN }
  for (let index = 0; index <= size; index++) {
    const place = ((index % size) * entries) / size
    const entry = Math.floor(place)
    const fed = table[entry]! + (place - entry) * (table[(entry + 1) % entries]! - table[entry]!)
    const left = torque[index % size]! - fed
    const step = stepNm > 0 ? Math.round(fed / stepNm) : 0
    note(left + (stepNm > 0 ? fed - step * stepNm : 0))
    if (step !== before.step && index > 0) {
      const middle = (left + before.left) / 2
      note(middle + stepNm / 2)
      note(middle - stepNm / 2)
    }
    before = { left, step }
  }
  return highest - lowest
}
