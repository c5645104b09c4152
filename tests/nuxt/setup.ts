import { registerEndpoint } from '@nuxt/test-utils/runtime'

/** Components are mounted in the whole application, which asks who is signed in. */
registerEndpoint('/api/session', () => ({ person: null, timeZone: 'Europe/Berlin', plantName: 'Kestrel Fold Robotics', demo: false }))
