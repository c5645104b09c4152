import { mkdtempSync, rmSync } from 'node:fs'
import { createServer } from 'node:net'
import type { AddressInfo } from 'node:net'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { onTestFinished } from 'vitest'
import { startDemoMailServer } from '../../../server/mail/demo-server'
import { createMailTransport } from '../../../server/mail/transport'

export const SENDER = 'incoming@kestrelfold.example'

/** A real mail server on loopback with a transport to it, closed after the test. */
export async function openMailServer() {
  const folder = mkdtempSync(join(tmpdir(), 'evenlot-mail-'))
  const server = await startDemoMailServer(folder)
  onTestFinished(async () => {
    await server.close()
    rmSync(folder, { recursive: true, force: true })
  })
  return { server, folder, transport: transportTo(server.port) }
}

export const transportTo = (port: number) => createMailTransport({ host: '127.0.0.1', port, secure: false, user: '', password: '', sender: SENDER })

/** A port on which nothing listens. */
export async function deadPort(): Promise<number> {
  const server = createServer()
  await new Promise<void>(resolve => server.listen(0, '127.0.0.1', resolve))
  const { port } = server.address() as AddressInfo
  await new Promise(resolve => server.close(resolve))
  return port
}
