/**
 * Copying a selection gives raw values: every element with `data-raw` contributes that attribute in place of
 * its typeset text, so that a pasted number can be computed with. Table cells are parted by tabs.
 */
export function rawText(node: Node): string {
  if (node.nodeType === Node.TEXT_NODE) return node.textContent ?? ''
  if (!(node instanceof Element || node instanceof DocumentFragment)) return ''
  if (node instanceof Element) {
    const raw = node.getAttribute('data-raw')
    if (raw !== null) return raw
    if (node.getAttribute('aria-hidden') === 'true') return ''
  }
  const inner = [...node.childNodes].map(rawText).join('')
  const tag = node instanceof Element ? node.tagName : ''
  if (tag === 'TD' || tag === 'TH') return node.nextSibling ? `${inner}\t` : inner
  return /^(TR|P|DIV|LI|H[1-6]|DT|DD)$/.test(tag) ? `${inner}\n` : inner
}

/** Starts listening; returns the function that stops it. */
export function copyRawValues(target: Document): () => void {
  const listen = (event: ClipboardEvent) => {
    const selection = target.getSelection()
    if (!selection || selection.isCollapsed || !event.clipboardData) return
    const anchor = selection.anchorNode
    const element = anchor instanceof Element ? anchor : anchor?.parentElement
    if (element?.closest('input, textarea, [contenteditable]')) return
    const range = selection.getRangeAt(0)
    const inside = range.commonAncestorContainer
    const single = (inside instanceof Element ? inside : inside.parentElement)?.closest('[data-raw]')
    const content = range.cloneContents()
    if (!single && !content.querySelector('[data-raw]')) return
    event.clipboardData.setData('text/plain', single?.getAttribute('data-raw') ?? rawText(content).trimEnd())
    event.preventDefault()
  }
  target.addEventListener('copy', listen)
  return () => target.removeEventListener('copy', listen)
}
