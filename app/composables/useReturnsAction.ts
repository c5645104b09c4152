import type { ErrorResponse } from '#shared/contracts/errors'

/** One step of a nonconformance: sends it, keeps what went wrong, and says whether it was taken. */
export function useReturnsAction(number: MaybeRefOrGetter<string>) {
  const busy = ref(false)
  const error = ref<ErrorResponse | null>(null)

  async function send(step: string, body: Record<string, unknown> = {}): Promise<boolean> {
    busy.value = true
    error.value = null
    try {
      await send(`/api/nonconformances/${encodeURIComponent(toValue(number))}/${step}`, body)
      return true
    }
    catch (failure) {
      error.value = readApiError(failure)
      return false
    }
    finally {
      busy.value = false
    }
  }

  return { busy, error, send }
}
