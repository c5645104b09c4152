import { planPreviewSchema } from '#shared/contracts/lots'
import { previewPlan } from '../../services/lots/preview-plan'

export default guardedRoute('POST /api/lots/plan-preview', { body: planPreviewSchema, handle: ({ context, body }) => previewPlan(context, body) })
