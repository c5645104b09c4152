/** Lets a page send a text through the scan field, as if it had been scanned. */
export const useScanStore = defineStore('scan', () => {
  const request = ref('')
  return { request, send: (text: string) => void (request.value = text), done: () => void (request.value = '') }
})
