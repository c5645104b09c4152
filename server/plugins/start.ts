import { startServer } from '../utils/start-server'
import { setServices } from '../utils/services'

export default defineNitroPlugin((nitro) => {
  const started = startServer()
  setServices(started.then(({ services }) => services))
  started.catch((error: unknown) => {
    console.error(error instanceof Error ? error.message : error)
    process.exit(1)
  })
  nitro.hooks.hook('close', async () => (await started).close())
})
