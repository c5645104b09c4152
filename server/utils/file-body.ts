import { getRequestHeader } from 'h3'
import type { H3Event } from 'h3'
import { DomainError } from '../services/domain-error'

/** Largest file taken, bytes. */
export const LARGEST_FILE = 200 * 1024 * 1024

/**
 * The request's body as bytes, counted while it streams: the length a client claims is not trusted.
 *
 * @throws DomainError `too-large`, `invalid-input` when empty.
 */
export async function readFileBody(event: H3Event): Promise<Uint8Array> {
  if (Number(getRequestHeader(event, 'content-length') ?? 0) > LARGEST_FILE) throw tooLarge()
  const chunks: Buffer[] = []
  let size = 0
  for await (const chunk of event.node.req) {
    size += chunk.length
    if (size > LARGEST_FILE) throw tooLarge()
    chunks.push(chunk)
  }
  if (size === 0) throw new DomainError('invalid-input', 'The file is empty. Nothing was kept; export it again from the rig.')
  // A copy of its own: Node's small buffers share one pool, which must not be sent to a worker thread.
  return new Uint8Array(Buffer.concat(chunks))
}

function tooLarge(): DomainError {
  return new DomainError('too-large', 'The file is larger than 200 MB. Nothing was kept; export fewer turns or fewer samples a turn.')
}
