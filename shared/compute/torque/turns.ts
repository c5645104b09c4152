import { shortestStep } from './directions'
import type { Readings } from './readings'

const TURN_RAD = 2 * Math.PI

/** Turn-to-turn scatter of the readings of one direction. */
export interface TurnScatter {
  /** Whole turns. */
  turns: number
  /** Pooled standard deviation between turns of the mean over one bin, N·m; null with fewer than two turns. */
  deviationNm: number | null
  degreesOfFreedom: number
}

/** Gathers the bins' means turn by turn. */
class TurnMeans {
  private readonly sum: Float64Array
  private readonly count: Uint32Array
  private readonly turns: Uint32Array
  private readonly means: Float64Array
  private readonly squares: Float64Array

  constructor(private readonly bins: number) {
    this.sum = new Float64Array(bins)
    this.count = new Uint32Array(bins)
    this.turns = new Uint32Array(bins)
    this.means = new Float64Array(bins)
    this.squares = new Float64Array(bins)
  }

  add(angleRad: number, value: number): void {
    const bin = Math.floor((angleRad * this.bins) / TURN_RAD) & (this.bins - 1)
    this.sum[bin]! += value
    this.count[bin]!++
  }

  endTurn(): void {
    for (let bin = 0; bin < this.bins; bin++) {
      if (this.count[bin] === 0) continue
      const mean = this.sum[bin]! / this.count[bin]!
      this.turns[bin]!++
      // Welford's recurrence (1962; from memory).
      const off = mean - this.means[bin]!
      this.means[bin]! += off / this.turns[bin]!
      this.squares[bin]! += off * (mean - this.means[bin]!)
      this.sum[bin] = this.count[bin] = 0
    }
  }

  pooled(): { deviationNm: number | null; degreesOfFreedom: number } {
    let squares = 0
    let degreesOfFreedom = 0
    for (let bin = 0; bin < this.bins; bin++) {
      if (this.turns[bin]! < 2) continue
      squares += this.squares[bin]!
      degreesOfFreedom += this.turns[bin]! - 1
    }
    return { deviationNm: degreesOfFreedom > 0 ? Math.sqrt(squares / degreesOfFreedom) : null, degreesOfFreedom }
  }
}

/**
 * Repeatability from turn to turn: how far the map at one angle differs between turns of one direction.
 *
 * What the fit leaves is averaged over bins of half a period of the highest order, turn by turn, so that the scatter is that of a fitted map and not of
 * single readings; s = √(Σ_bins Σ_turns (mean − mean of turns)² / Σ_bins (turns − 1)).
 *
 * @param readings - angles
 * @param residuals - what the fit leaves of each reading, N·m
 * @param labels - direction of each reading
 * @param direction - the direction meant
 * @param highestOrder - K
 */
export function turnScatter(readings: Readings, residuals: Float64Array, labels: Int8Array, direction: 1 | -1, highestOrder: number): TurnScatter {
  let bins = 16
  while (bins * 2 <= 2 * highestOrder + 1) bins *= 2
  const means = new TurnMeans(bins)
  let run = 0
  let finished = 0
  let last = NaN
  let count = 0
  for (let row = 0; row < readings.rows; row++) {
    if (labels[row] !== direction) continue
    const angle = readings.angleRad[row]!
    if (!Number.isNaN(last)) run += shortestStep(last, angle)
    last = angle
    count++
    // The end point of a turn belongs to it, not to a turn of one reading.
    if (Math.abs(run) > TURN_RAD * (finished + 1) * (1 + 1e-9)) {
      means.endTurn()
      finished++
    }
    means.add(angle, residuals[row]!)
  }
  means.endTurn()
  const covered = Math.abs(run) * (1 + 1.5 / Math.max(count, 2))
  return { turns: Math.floor(covered / TURN_RAD + 1e-9), ...means.pooled() }
}
