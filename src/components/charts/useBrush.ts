import { useRef, useState, type PointerEvent, type RefObject } from 'react'

/** A rectangle in the pixels of a drawing; x0, y0 is where the drag began. */
export interface Box {
  readonly x0: number
  readonly y0: number
  readonly x1: number
  readonly y1: number
}

interface Point {
  readonly x: number
  readonly y: number
}

interface BrushHandlers {
  onPointerDown: (event: PointerEvent<SVGSVGElement>) => void
  onPointerMove: (event: PointerEvent<SVGSVGElement>) => void
  onPointerUp: (event: PointerEvent<SVGSVGElement>) => void
  onPointerCancel: () => void
  onPointerLeave: () => void
}

/** Below this many pixels a drag is a click. */
const clickReach = 4

/** Dragging over a drawing. */
export function useBrush({
  onSelect,
  onClick,
  onHover,
}: {
  onSelect: (box: Box) => void
  onClick: (at: Point) => void
  onHover?: (at: Point | null) => void
}): { svg: RefObject<SVGSVGElement | null>; drag: Box | null; handlers: BrushHandlers } {
  const svg = useRef<SVGSVGElement>(null)
  const [drag, setDrag] = useState<Box | null>(null)
  const at = (event: PointerEvent): Point => {
    const box = svg.current?.getBoundingClientRect()
    return box ? { x: event.clientX - box.left, y: event.clientY - box.top } : { x: 0, y: 0 }
  }
  return {
    svg,
    drag,
    handlers: {
      onPointerDown: (event) => {
        if (event.button !== 0) return
        const { x, y } = at(event)
        setDrag({ x0: x, y0: y, x1: x, y1: y })
        event.currentTarget.setPointerCapture(event.pointerId)
      },
      onPointerMove: (event) => {
        const { x, y } = at(event)
        if (drag) setDrag({ ...drag, x1: x, y1: y })
        else onHover?.({ x, y })
      },
      onPointerUp: (event) => {
        if (!drag) return
        setDrag(null)
        const { x, y } = at(event)
        const still = Math.abs(x - drag.x0) < clickReach && Math.abs(y - drag.y0) < clickReach
        if (still) onClick({ x, y })
        else onSelect({ ...drag, x1: x, y1: y })
      },
      onPointerCancel: () => setDrag(null),
      onPointerLeave: () => onHover?.(null),
    },
  }
}
