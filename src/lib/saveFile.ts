/** Hands a file made in the browser to the person, as a download. */
export function saveFile(name: string, content: BlobPart, type: string): void {
  const url = URL.createObjectURL(new Blob([content], { type }))
  const link = document.createElement('a')
  link.href = url
  link.download = name
  link.click()
  setTimeout(() => URL.revokeObjectURL(url), 1_000)
}

/** Saves what an address of the server answers with. */
export function saveFrom(url: string): void {
  const link = document.createElement('a')
  link.href = url
  link.download = ''
  link.click()
}

const kept = [
  'fill',
  'stroke',
  'stroke-width',
  'stroke-dasharray',
  'stroke-linecap',
  'stroke-linejoin',
  'paint-order',
  'opacity',
  'font-size',
  'font-family',
  'font-weight',
  'text-anchor',
]

/** A copy whose elements carry the colours that the style sheet gave the original. */
function styledCopy(svg: SVGSVGElement): SVGSVGElement {
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
  copy.setAttribute('xmlns', svgNamespace)
  return copy
}

const svgNamespace = 'http://www.w3.org/2000/svg'

/** Drawings as one file of their own; several keep the places they have on the page. */
export function standaloneSvg(drawings: readonly SVGSVGElement[]): string {
  const head = '<?xml version="1.0" encoding="UTF-8"?>\n'
  const write = (element: Element) => `${head}${new XMLSerializer().serializeToString(element)}\n`
  const [first] = drawings
  if (drawings.length === 1 && first) return write(styledCopy(first))
  const boxes = drawings.map((drawing) => drawing.getBoundingClientRect())
  const left = Math.min(...boxes.map((box) => box.left))
  const top = Math.min(...boxes.map((box) => box.top))
  const sheet = document.createElementNS(svgNamespace, 'svg')
  sheet.setAttribute('width', String(Math.ceil(Math.max(...boxes.map((box) => box.right)) - left)))
  sheet.setAttribute('height', String(Math.ceil(Math.max(...boxes.map((box) => box.bottom)) - top)))
  drawings.forEach((drawing, index) => {
    const copy = styledCopy(drawing)
    copy.setAttribute('x', String((boxes[index]?.left ?? 0) - left))
    copy.setAttribute('y', String((boxes[index]?.top ?? 0) - top))
    sheet.append(copy)
  })
  return write(sheet)
}
