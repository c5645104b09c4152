import { getServices, whenReady } from '../../utils/services'

/** Every minute: draws papers that are new or awaited. */
export default defineTask({
  meta: { name: 'papers:draw', description: 'Draws certificates that are new or awaited' },
  async run() {
    await whenReady()
    getServices().wake('papers')
    return { result: 'woken' }
  },
})
