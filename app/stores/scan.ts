/** The text in the scan field; a page may send one through it, as if it had been scanned. */
export const useScanStore = defineStore('scan', () => {
  const text = ref('')
  const request = ref('')
  return { text, request, send: (label: string) => void (request.value = label), done: () => void (request.value = '') }
})
