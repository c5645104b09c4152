import { errorResponseSchema } from '#shared/contracts/errors'
import type { ErrorResponse } from '#shared/contracts/errors'
import type { UploadAnswer } from '#shared/contracts/lots'

/** One file on its way to a verdict. */
export interface UploadRow {
  key: number
  file: File
  state: 'waiting' | 'sending' | 'judging' | 'done' | 'failed'
  /** 0…1 of the bytes sent. */
  progress: number
  answer: UploadAnswer | null
  error: ErrorResponse | null
}

const IN_PARALLEL = 3
/** Refreshes the lot at most this often while files come in, ms. */
const REFRESH_MS = 600

/** Sends files of a lot, a few at a time; each row keeps its place and its answer. */
export function useLotUploads(lotNumber: string, rig: Ref<string>, refresh: () => Promise<unknown>) {
  const rows = ref<UploadRow[]>([])
  let nextKey = 1
  let timer: ReturnType<typeof setTimeout> | undefined

  function add(files: Iterable<File>): void {
    for (const file of files) rows.value.push({ key: nextKey++, file, state: 'waiting', progress: 0, answer: null, error: null })
    pump()
  }

  function retry(row: UploadRow, reason = ''): void {
    row.state = 'waiting'
    row.error = null
    row.answer = null
    reasons.set(row.key, reason)
    pump()
  }

  const reasons = new Map<number, string>()

  function pump(): void {
    const active = rows.value.filter(row => row.state === 'sending' || row.state === 'judging').length
    for (const row of rows.value.filter(each => each.state === 'waiting').slice(0, Math.max(0, IN_PARALLEL - active))) void send(row)
  }

  async function send(row: UploadRow): Promise<void> {
    row.state = 'sending'
    row.progress = 0
    const result = await post(row)
    if ('answer' in result) {
      row.answer = result.answer
      row.state = 'done'
    }
    else {
      row.error = result.error
      row.state = 'failed'
    }
    scheduleRefresh()
    pump()
  }

  function post(row: UploadRow): Promise<{ answer: UploadAnswer } | { error: ErrorResponse }> {
    return new Promise((resolve) => {
      const request = new XMLHttpRequest()
      const query = new URLSearchParams({ name: row.file.name, rig: rig.value, reason: reasons.get(row.key) ?? '' })
      request.open('POST', `/api/lots/${encodeURIComponent(lotNumber)}/uploads?${query}`)
      request.setRequestHeader('content-type', 'application/octet-stream')
      request.responseType = 'json'
      request.upload.onprogress = (event) => {
        row.progress = event.lengthComputable ? event.loaded / event.total : 0
        if (row.progress >= 1) row.state = 'judging'
      }
      const lost: ErrorResponse = { code: 'no-answer', message: 'The connection was lost. The file is still chosen here; press “Try again”.', fields: [], link: null, requestId: '' }
      request.onload = () => {
        const problem = errorResponseSchema.safeParse(request.response)
        if (request.status === 200) resolve({ answer: request.response as UploadAnswer })
        else resolve({ error: problem.success ? problem.data : lost })
      }
      request.onerror = () => resolve({ error: lost })
      request.send(row.file)
    })
  }

  function scheduleRefresh(): void {
    timer ??= setTimeout(() => {
      timer = undefined
      void refresh()
    }, REFRESH_MS)
  }

  /** Leaving the page in the middle is asked about once; what was sent is kept in any case. */
  function onLeave(event: BeforeUnloadEvent): void {
    if (busy.value) event.preventDefault()
  }
  onMounted(() => window.addEventListener('beforeunload', onLeave))

  /** Where the files stand, in a few words; '' when there are none. */
  const summary = computed(() => {
    const judged = rows.value.filter(row => row.answer?.state === 'judged').length
    const lookAt = rows.value.filter(row => row.state === 'failed' || (row.answer && row.answer.state !== 'judged')).length
    const under = rows.value.length - judged - lookAt
    return [under ? `${under} on the way` : '', judged ? `${judged} judged` : '', lookAt ? `${lookAt} to look at` : ''].filter(text => text !== '').join(', ')
  })
  const busy = computed(() => rows.value.some(row => row.state !== 'done' && row.state !== 'failed'))
  /** Takes finished rows off the list; one that was not sent stays until it is sent or left out by hand. */
  const clear = () => void (rows.value = rows.value.filter(row => row.state !== 'done'))
  const leaveOut = (row: UploadRow) => void (rows.value = rows.value.filter(each => each.key !== row.key))
  onBeforeUnmount(() => {
    clearTimeout(timer)
    window.removeEventListener('beforeunload', onLeave)
  })
  return { rows, add, retry, clear, leaveOut, summary }
}
