import { readdirSync } from 'node:fs'
import { join, relative } from 'node:path'
import { fileURLToPath } from 'node:url'
import type { APIRequestContext } from 'playwright-core'

const PAGES = fileURLToPath(new URL('../../../app/pages', import.meta.url))

/** Addresses of all pages, as their files name them: `/lots/[number]/motors/[serial]`. */
export function pageFiles(): string[] {
  return readdirSync(PAGES, { withFileTypes: true, recursive: true }).filter(entry => entry.isFile() && entry.name.endsWith('.vue'))
    .map(entry => `/${relative(PAGES, join(entry.parentPath, entry.name)).replace(/\.vue$/, '').replace(/(^|\/)index$/, '')}`).map(path => path === '/' ? path : path.replace(/\/$/, '')).sort()
}

interface Known { lot: string; serial: string; paper: string; token: string; nonconformance: string }

/** Names of things that the demo data holds, by asking the server as an engineer. */
export async function findKnown(request: APIRequestContext): Promise<Known> {
  const get = async (path: string) => await (await request.get(path)).json() as { rows: Record<string, string>[] }
  const paper = (await get('/api/papers?kind=rejection')).rows[0]!
  const page = await (await request.get(`/api/lots/${paper.lotNumber}`)).json() as { samples: { serial: string; state: string }[]; nonconformance: { number: string } }
  return { lot: paper.lotNumber!, serial: page.samples.find(sample => sample.state === 'judged')!.serial, paper: paper.number!, token: paper.checkLink!.split('/').at(-1)!, nonconformance: page.nonconformance.number }
}

/** A real address for a page's pattern. */
export function addressOf(pattern: string, known: Known): string {
  const values: Record<string, string> = {
    '/check/[token]': known.token, '/papers/[number]': known.paper, '/returns/[number]': known.nonconformance, '/limits/[number]': 'KF-4412-C', '/rigs/[code]': 'TR-1',
  }
  return pattern.replace('/motors/[serial]', `/motors/${known.serial}`).replace(/\/lots\/\[number\]/, `/lots/${known.lot}`).replace(/\[[^\]]+\]/, values[pattern] ?? '')
}

/** Who looks at a page in tests: the role for which it is made. */
export function visitorOf(pattern: string): string | null {
  if (/^\/(sign-in|check|mailbox)/.test(pattern)) return null
  if (pattern === '/people') return 'sander@kestrelfold.example'
  if (pattern === '/supplier') return 'quality@tuvalo.example'
  if (pattern === '/logbook') return 'ottilie@kestrelfold.example'
  return 'mara@kestrelfold.example'
}

export const DEMO_PASSWORD = 'smooth motors turn round'
