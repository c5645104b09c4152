import type { ErrorResponse } from '#shared/contracts/errors'

/** Runs something that may fail and keeps what went wrong for the form. */
export function useAction() {
  const busy = ref(false)
  const error = ref<ErrorResponse | null>(null)

  /** @returns whether it went well. */
  async function run(act: () => Promise<unknown>): Promise<boolean> {
    busy.value = true
    error.value = null
    try {
      await act()
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

  return { busy, error, run, message: (field: string) => fieldMessage(error.value, field) }
}
