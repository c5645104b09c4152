import { asc } from 'drizzle-orm'
import { drawSample } from '#shared/compute/sampling/draw'
import { measurements } from '../database/schema/measurements'
import { recheckMeasurement } from '../services/checking/recheck-measurement'
import { openData } from './open-data'

/** Re-analyses a random sample of the stored measurements (--sample N, all without it; --seed HEX repeats one); exit 0 only if every figure and verdict follows. */
const { db, files, values, close } = openData({ sample: { type: 'string' }, seed: { type: 'string' } })
const ids = db.select({ id: measurements.id }).from(measurements).orderBy(asc(measurements.id)).all().map(row => row.id)
const wanted = values.sample === undefined ? ids.length : Number(values.sample)
if (!Number.isInteger(wanted) || wanted < 1) {
  console.error('--sample takes a whole number from 1.')
  process.exit(1)
}
const seed = values.seed ?? [...crypto.getRandomValues(new Uint8Array(8))].map(byte => byte.toString(16).padStart(2, '0')).join('')
const chosen = ids.length === 0 ? [] : drawSample({ lotSize: ids.length, n: Math.min(wanted, ids.length), seed }).map(position => ids[position - 1]!)
let failed = 0
for (const id of chosen) {
  const problems = await recheckMeasurement({ db, files }, id)
  if (problems.length > 0) failed += 1
  for (const problem of problems) console.log(problem)
}
close()
console.log(`${chosen.length - failed} of ${chosen.length} measurements follow from their raw files (of ${ids.length} stored, seed ${seed}).`)
process.exitCode = failed === 0 ? 0 : 1
