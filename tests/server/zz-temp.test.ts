import { it } from 'vitest'
import { writeFileSync } from 'node:fs'
import { papers } from '../../server/database/schema/papers'
import { seedDemo } from '../../server/database/seed/seed-demo'
import { drawPaper } from '../../server/services/papers/draw-papers'
import { FONTS } from './support/fonts'
import { openTestServices } from './support/services'
it('draws', async () => {
  const { services } = openTestServices()
  await seedDemo(services, 'small')
  for (const paper of services.db.select().from(papers).all()) {
    const t = Date.now()
    const sha = await drawPaper(services, FONTS, paper.id)
    const bytes = await services.files.get(sha)
    console.log(paper.number, paper.kind, bytes.length, Date.now() - t, 'ms')
    writeFileSync(`/tmp/${paper.number}.pdf`, bytes)
  }
}, 300000)
