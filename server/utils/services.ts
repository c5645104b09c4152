import type { Services } from '../services/context'

let running: Services | null = null
let starting: Promise<Services> | null = null

/** Called once by the start-up plugin; requests wait until the services are there. */
export function setServices(promise: Promise<Services>): void {
  starting = promise.then((services) => {
    running = services
    return services
  })
}

/** Resolves when the server is ready to answer. */
export async function whenReady(): Promise<void> {
  if (!starting) throw new Error('The start-up plugin has not run.')
  await starting
}

/** The services of the running server. */
export function getServices(): Services {
  if (!running) throw new Error('The server is still starting.')
  return running
}
