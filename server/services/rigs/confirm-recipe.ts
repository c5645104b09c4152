import { eq } from 'drizzle-orm'
import type { ColumnRecipe } from '#shared/compute/terms/measurement'
import { rigs } from '../../database/schema/rigs'
import { now } from '../context'
import type { Context } from '../context'
import { DomainError } from '../domain-error'
import { appendToLogbook } from '../logbook/append'

/** Keeps what a person said about a rig's columns: it answers for files whose header leaves a unit open. Counts the version up. */
export function confirmRecipe(context: Context, code: string, recipe: ColumnRecipe): void {
  const open = recipe.columns.find(column => column.unit === null)
  if (open) throw new DomainError('invalid-input', `The unit of the ${open.role} column is still open. Choose it.`, { fields: [{ field: open.role, message: 'Choose the unit.' }] })
  context.db.transaction((tx) => {
    const rig = tx.select().from(rigs).where(eq(rigs.code, code)).get()
    if (!rig) throw new DomainError('not-found', `There is no rig ${code}.`)
    const version = (rig.recipe?.version ?? 0) + 1
    tx.update(rigs).set({ recipe: { ...recipe, version }, recipeConfirmedById: context.actor.personId, recipeConfirmedAt: now(context) }).where(eq(rigs.id, rig.id)).run()
    appendToLogbook(context, tx, { actorId: context.actor.personId, action: 'rig.recipe-confirmed', subjectKind: 'rig', subjectId: rig.code, content: { version, columns: recipe.columns as unknown as Record<string, unknown>[] } })
  }, { behavior: 'immediate' })
}
