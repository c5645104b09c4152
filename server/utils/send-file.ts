import { setResponseHeaders } from 'h3'
import type { H3Event } from 'h3'

/** Answers with a file to be saved, never shown in place; the name is made safe for the header. */
export function sendFile(event: H3Event, file: { name: string; bytes: Uint8Array; type?: string }): Uint8Array {
  const ascii = file.name.replaceAll(/[^\w.\- ()]/g, '_')
  setResponseHeaders(event, {
    'content-type': file.type ?? 'application/octet-stream',
    'content-disposition': `attachment; filename="${ascii}"; filename*=UTF-8''${encodeURIComponent(file.name)}`,
    'x-content-type-options': 'nosniff',
  })
  return file.bytes
}
