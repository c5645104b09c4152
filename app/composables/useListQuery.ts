/** A list's filter, sort and page, kept in the address: a link shows the same rows again. */
export function useListQuery<Keys extends string>(defaults: Record<Keys, string>) {
  const route = useRoute()
  const router = useRouter()
  const query = computed(() => Object.fromEntries(Object.entries(defaults).map(([key, value]) => {
    const given = route.query[key]
    return [key, typeof given === 'string' ? given : value]
  })) as Record<Keys, string>)

  /** Changes some of it; anything but the page itself goes back to the first page. */
  function change(part: Partial<Record<Keys | 'page', string>>): void {
    const next = { ...query.value, ...('page' in part ? {} : { page: '1' }), ...part } as Record<string, string>
    const told = Object.fromEntries(Object.entries(next).filter(([key, value]) => value !== (defaults as Record<string, string>)[key]))
    void router.replace({ query: told })
  }

  return { query, change }
}
