/** The last answer that came: a refresh that fails, as when the network is gone for a moment, leaves the page as it was. */
export function useLastGood<Answer>(data: Ref<Answer | null | undefined>, first: Answer): Readonly<Ref<Answer>> {
  const kept = shallowRef(first)
  watch(data, (answer) => {
    if (answer) kept.value = answer
  }, { flush: 'sync' })
  return kept
}
