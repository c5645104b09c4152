import { getServices, whenReady } from '../../utils/services'

/** Every minute: sends notices whose next try has come. */
export default defineTask({
  meta: { name: 'outbox:send', description: 'Sends notices that are due' },
  async run() {
    await whenReady()
    getServices().wake('outbox')
    return { result: 'woken' }
  },
})
