import AxeBuilder from '@axe-core/playwright'
import { describe, expect, it } from 'vitest'
import { signIn, useBrowser, visit } from './support/browser'
import { addressOf, DEMO_PASSWORD, findKnown, pageFiles, visitorOf } from './support/pages'

useBrowser()

/** Widths at which each page is looked at; phones for what is used on phones. */
const SIZES = [{ width: 1440, height: 900 }, { width: 1024, height: 768 }, { width: 390, height: 844 }] as const

describe('every page', () => {
  const patterns = pageFiles()

  it('is found by itself', () => {
    expect(patterns.length).toBeGreaterThan(15)
  })

  for (const theme of ['light', 'dark'] as const) {
    it(`has no axe violation, no error, no hydration warning and no sideways overflow (${theme})`, async () => {
      const problems: string[] = []
      const scout = await visit()
      await signIn(scout.page, 'mara@kestrelfold.example', DEMO_PASSWORD)
      const known = await findKnown(scout.page.request)
      await scout.context.close()
      const groups = new Map<string | null, string[]>()
      for (const pattern of patterns) groups.set(visitorOf(pattern), [...groups.get(visitorOf(pattern)) ?? [], pattern])
      for (const [email, list] of groups) {
        const visitor = await visit({ colorScheme: theme })
        if (email) await signIn(visitor.page, email, DEMO_PASSWORD)
        for (const pattern of list) {
          const address = addressOf(pattern, known)
          for (const size of theme === 'light' ? SIZES : SIZES.slice(0, 1)) {
            await visitor.page.setViewportSize(size)
            await visitor.page.goto(address)
            await visitor.page.waitForLoadState('networkidle')
            problems.push(...visitor.complaints.splice(0).map(line => `${pattern} at ${size.width}: ${line}`))
            const width = await visitor.page.evaluate(() => document.documentElement.scrollWidth)
            if (width > size.width) problems.push(`${pattern} at ${size.width}: ${width} px wide`)
            if (size.width === 1024) continue
            // The mail frame is sandboxed without scripts, so nothing can look into it.
            const { violations } = await new AxeBuilder({ page: visitor.page }).exclude('iframe').analyze()
            problems.push(...violations.map(found => `${pattern} at ${size.width}: ${found.id} on ${found.nodes.slice(0, 3).map(node => node.target.join(' ')).join(', ')}`))
          }
        }
        await visitor.context.close()
      }
      expect(problems).toEqual([])
    })
  }
})
