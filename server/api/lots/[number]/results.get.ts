import { lotParamsSchema } from '#shared/contracts/lots'
import { resultsQuerySchema } from '#shared/contracts/returns'
import { getLotResults, resultsAsCsv } from '../../../services/lots/lot-results'
import { sendFile } from '../../../utils/send-file'

export default guardedRoute('GET /api/lots/:number/results', {
  params: lotParamsSchema,
  query: resultsQuerySchema,
  handle: ({ context, params, query, event }) => {
    const results = getLotResults(context, params.number)
    const [content, type] = query.format === 'csv' ? [resultsAsCsv(results), 'text/csv; charset=utf-8'] : [JSON.stringify(results, null, 2), 'application/json']
    return sendFile(event, { name: `${results.lot}-results.${query.format}`, bytes: Buffer.from(content), type })
  },
})
