import { randomUUID } from 'node:crypto'
import { setResponseHeader } from 'h3'

export default defineEventHandler((event) => {
  event.context.requestId = randomUUID().slice(0, 8)
  setResponseHeader(event, 'x-request-id', event.context.requestId)
})
