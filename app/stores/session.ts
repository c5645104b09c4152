import type { Person, SessionResponse } from '#shared/contracts/session'

/** Who is signed in, and how the plant shows its times. */
export const useSessionStore = defineStore('session', () => {
  const person = ref<Person | null>(null)
  const timeZone = ref('UTC')
  const plantName = ref('')
  const demo = ref(false)
  const loaded = ref(false)
  /** When this page last asked, ms since it was opened; on the server always 0. */
  const checkedAt = ref(0)

  async function load(): Promise<void> {
    const session = await useRequestFetch()<SessionResponse>('/api/session')
    person.value = session.person
    timeZone.value = session.timeZone
    plantName.value = session.plantName
    demo.value = session.demo
    loaded.value = true
    if (import.meta.client) checkedAt.value = performance.now()
  }

  return { person, timeZone, plantName, demo, loaded, checkedAt, load }
})
