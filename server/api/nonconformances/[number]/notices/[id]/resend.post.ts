import { noticeParamsSchema } from '#shared/contracts/returns'
import { resendNotice } from '../../../../../services/notices/resend-notice'

export default guardedRoute('POST /api/nonconformances/:number/notices/:id/resend', {
  params: noticeParamsSchema,
  handle: ({ context, params }) => {
    resendNotice(context, params.number, params.id)
    return { done: true }
  },
})
