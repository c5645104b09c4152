import type { SessionResponse } from '#shared/contracts/session'
import { describePerson } from '../../services/people/describe-person'

export default publicRoute('GET /api/session', {
  handle: ({ services, actor }): SessionResponse => ({
    person: actor ? describePerson(services, actor) : null,
    timeZone: services.settings.plantTimeZone,
    plantName: services.settings.plantName,
    demo: services.settings.demo,
  }),
})
