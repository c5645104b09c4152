/** One step of a nonconformance: sends it, keeps what went wrong, and says whether it was taken. */
export function useReturnsAction(number: MaybeRefOrGetter<string>) {
  const { busy, error, run } = useAction()
  const step = (name: string, body: Record<string, unknown> = {}) => run(() => send(`/api/nonconformances/${encodeURIComponent(toValue(number))}/${name}`, body))
  return { busy, error, send: step }
}
