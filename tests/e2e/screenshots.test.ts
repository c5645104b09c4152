import { mkdirSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { signIn, useBrowser, visit } from './support/browser'
import { addressOf, DEMO_PASSWORD, findKnown, pageFiles, visitorOf } from './support/pages'

useBrowser()
/** `npm run -s screenshots` names the folder; otherwise nothing is drawn. */
const folder = process.env.SCREENSHOTS ?? ''
const SIZES = [{ width: 1440, height: 900 }, { width: 1024, height: 768 }, { width: 390, height: 844 }] as const

describe.skipIf(folder === '')('screenshots', () => {
  it('shows every page at every width in both themes', async () => {
    mkdirSync(folder, { recursive: true })
    const scout = await visit()
    await signIn(scout.page, 'mara@kestrelfold.example', DEMO_PASSWORD)
    const known = await findKnown(scout.page.request)
    await scout.context.close()
    let drawn = 0
    for (const theme of ['light', 'dark'] as const) {
      for (const pattern of pageFiles()) {
        const email = visitorOf(pattern)
        const { context, page } = await visit({ colorScheme: theme })
        if (email) await page.request.post('/api/session', { data: { email, password: DEMO_PASSWORD } })
        for (const size of SIZES) {
          await page.setViewportSize(size)
          await page.goto(addressOf(pattern, known))
          await page.waitForLoadState('networkidle')
          const name = pattern.replaceAll(/[^a-z]+/g, '-').replaceAll(/^-|-$/g, '') || 'start'
          await page.screenshot({ path: join(folder, `${name}-${size.width}-${theme}.png`), fullPage: true })
          drawn += 1
        }
        await context.close()
      }
    }
    expect(drawn).toBe(pageFiles().length * SIZES.length * 2)
  }, 900_000)
})
