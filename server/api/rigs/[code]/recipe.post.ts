import { confirmRecipeSchema, rigParamsSchema } from '#shared/contracts/rigs'
import { confirmRecipe } from '../../../services/rigs/confirm-recipe'

export default guardedRoute('POST /api/rigs/:code/recipe', {
  params: rigParamsSchema,
  body: confirmRecipeSchema,
  handle: ({ context, params, body }) => {
    confirmRecipe(context, params.code, body.recipe)
    return { done: true }
  },
})
