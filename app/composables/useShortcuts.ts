/** A letter that stays alone this long was pressed by a person; the keys of a hand scanner follow each other within some 30 ms. */
const ALONE_MS = 180

/** Whether a key pressed there belongs to a field or a figure of its own; the scan field does not count, it has the focus by itself. */
const ownsKeys = (target: EventTarget | null): boolean => target instanceof HTMLElement || target instanceof SVGElement
  ? target.id !== 'scan' && target.closest('input, textarea, select, [contenteditable], svg[tabindex]') !== null
  : false

/**
 * Single keys that act on a page (`u`, `j`, `ArrowLeft`), while the scan field is empty. A letter acts only when nothing follows it, so that a scanned or
 * typed number that begins with it reaches the scan field whole.
 */
export function useShortcuts(actions: Record<string, () => void>): void {
  const scanning = useScanStore()
  let pending: ReturnType<typeof setTimeout> | undefined

  function onKey(event: KeyboardEvent): void {
    clearTimeout(pending)
    const name = event.key.length === 1 ? event.key.toLowerCase() : event.key
    const action = actions[name]
    if (!action || event.ctrlKey || event.metaKey || event.altKey || event.repeat || event.defaultPrevented || ownsKeys(event.target) || scanning.text !== '') return
    if (name.length > 1) return action()
    pending = setTimeout(() => {
      if (scanning.text.toLowerCase() !== name && scanning.text !== '') return
      scanning.text = ''
      action()
    }, ALONE_MS)
  }

  onMounted(() => window.addEventListener('keydown', onKey))
  onBeforeUnmount(() => {
    clearTimeout(pending)
    window.removeEventListener('keydown', onKey)
  })
}
