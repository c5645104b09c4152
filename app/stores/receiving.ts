import type { ReceivingPrefill } from '#shared/contracts/lots'

/** What a scanned label says, on its way to the receiving form; it stands in the address too, so that a reload keeps it. */
export const useReceivingStore = defineStore('receiving', () => {
  const form = ref<ReceivingPrefill>(empty())
  const notes = ref<string[]>([])

  function prefill(label: ReceivingPrefill, remarks: string[]): void {
    form.value = { ...label }
    notes.value = remarks
  }

  /** After the delivery is received, or when the form is opened without a label. */
  const clear = () => prefill(empty(), [])

  const toQuery = () => Object.fromEntries(Object.entries(form.value).filter(([, value]) => value !== '' && value !== null).map(([key, value]) => [key, String(value)]))

  function fromQuery(query: Record<string, unknown>): void {
    const text = (key: string) => typeof query[key] === 'string' ? query[key] : ''
    const quantity = Number(text('quantity'))
    form.value = { supplierCode: text('supplierCode'), partNumber: text('partNumber'), supplierLot: text('supplierLot'), quantity: Number.isInteger(quantity) && quantity > 0 ? quantity : null, orderNumber: text('orderNumber') }
  }

  return { form, notes, prefill, clear, toQuery, fromQuery }
})

function empty(): ReceivingPrefill {
  return { supplierCode: '', partNumber: '', supplierLot: '', quantity: null, orderNumber: '' }
}
