import { mkdtempSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { chromium } from 'playwright-core'
import type { Browser, BrowserContext, BrowserContextOptions, Page } from 'playwright-core'
import { afterAll, beforeAll, expect, inject } from 'vitest'

let browser: Browser

/** One Chromium for a test file. */
export function useBrowser(): void {
  beforeAll(async () => {
    browser = await chromium.launch({
      executablePath: process.env.CHROMIUM_PATH ?? '/usr/bin/chromium',
      args: ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking', '--disable-component-update', '--disable-sync'],
    })
  })
  afterAll(async () => {
    await browser?.close()
  })
}

export interface Visit {
  context: BrowserContext
  page: Page
  /** Errors and warnings of the page's console, and requests to anywhere else. */
  complaints: string[]
}

/**
 * A visitor of its own: German browser in Tokyo, so that anything that depends on the reader's place shows as a hydration warning.
 * Console errors, hydration warnings and foreign requests are collected.
 */
export async function visit(options: BrowserContextOptions = {}): Promise<Visit> {
  const origin = inject('origin')
  const context = await browser.newContext({ baseURL: origin, locale: 'de-DE', timezoneId: 'Asia/Tokyo', viewport: { width: 1440, height: 900 }, acceptDownloads: true, ...options })
  const page = await context.newPage()
  const complaints: string[] = []
  page.on('pageerror', error => complaints.push(`error: ${error.message}`))
  page.on('console', (message) => {
    if (message.type() === 'error' || message.text().includes('ydration')) complaints.push(`${message.type()}: ${message.text()}`)
  })
  page.on('request', (request) => {
    const url = new URL(request.url())
    if (url.protocol.startsWith('http') && url.origin !== origin) complaints.push(`foreign request: ${request.url()}`)
  })
  return { context, page, complaints }
}

/** Signs in by the form, as a person would. */
export async function signIn(page: Page, email: string, password: string): Promise<void> {
  await page.goto('/sign-in')
  await page.getByLabel('Address').fill(email)
  await page.getByLabel('Password').fill(password)
  await page.getByRole('button', { name: 'Sign in', exact: true }).click()
  await page.waitForURL(url => !url.pathname.startsWith('/sign-in'))
}

export const temporaryFolder = (): string => mkdtempSync(join(tmpdir(), 'evenlot-files-'))

/** Fails with the complaints themselves. */
export function expectNoComplaints(visitor: Visit): void {
  expect(visitor.complaints).toEqual([])
}
