export type Theme = 'system' | 'light' | 'dark'

/** Choices of this browser, kept in cookies so that the first paint is right. */
export const usePreferencesStore = defineStore('preferences', () => {
  const kept = { maxAge: 60 * 60 * 24 * 365, sameSite: 'lax' as const }
  const theme = useCookie<Theme>('evenlot-theme', { ...kept, default: () => 'system' })
  const rig = useCookie<string>('evenlot-rig', { ...kept, default: () => '' })
  return { theme, rig }
})
