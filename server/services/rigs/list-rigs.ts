import { asc } from 'drizzle-orm'
import { calibrations, rigs } from '../../database/schema/rigs'
import type { Context } from '../context'

/** Rigs in short, each with the due date of its latest calibration and whether it may be used today. */
export function listRigs(context: Context) {
  const today = context.clock().toISOString().slice(0, 10)
  const all = context.db.select().from(calibrations).orderBy(asc(calibrations.performedOn), asc(calibrations.id)).all()
  return context.db.select().from(rigs).orderBy(asc(rigs.code)).all().map((rig) => {
    const latest = all.filter(row => row.rigId === rig.id && row.performedOn <= today).at(-1)
    return {
      code: rig.code, name: rig.name, method: rig.method, location: rig.location, recipeConfirmed: rig.recipe !== null,
      calibration: latest?.certificateNumber ?? null, dueOn: latest?.dueOn ?? null, usable: latest !== undefined && latest.dueOn >= today,
    }
  })
}
