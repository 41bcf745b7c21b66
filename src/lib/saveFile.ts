/** Hands a file made in the browser to the person, as a download. */
export function saveFile(name: string, content: BlobPart, type: string): void {
  const url = URL.createObjectURL(new Blob([content], { type }))
  const link = document.createElement('a')
  link.href = url
  link.download = name
  link.click()
  setTimeout(() => URL.revokeObjectURL(url), 1_000)
}

const kept = [
  'fill',
  'stroke',
  'stroke-width',
  'stroke-dasharray',
  'opacity',
  'font-size',
  'font-family',
  'font-weight',
  'text-anchor',
]

/** A drawing as a file of its own: the colours the style sheet gave it are written into the elements. */
export function standaloneSvg(svg: SVGSVGElement): string {
  const copy = svg.cloneNode(true) as SVGSVGElement
  const originals = [svg, ...svg.querySelectorAll('*')]
  const copies = [copy, ...copy.querySelectorAll('*')]
  originals.forEach((original, index) => {
    const style = getComputedStyle(original)
    const target = copies[index]
    if (!target) return
    target.removeAttribute('class')
    target.setAttribute('style', kept.map((name) => `${name}:${style.getPropertyValue(name)}`).join(';'))
  })
  copy.setAttribute('xmlns', 'http://www.w3.org/2000/svg')
  return `<?xml version="1.0" encoding="UTF-8"?>\n${new XMLSerializer().serializeToString(copy)}\n`
}
