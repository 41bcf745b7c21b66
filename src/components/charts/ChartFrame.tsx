import { useRef, useState, type ReactNode } from 'react'
import { Download, Table2, ChartLine } from 'lucide-react'
import { IconButton } from '../ui/Button.tsx'
import { saveFile, standaloneSvg } from '../../lib/saveFile.ts'

interface ChartFrameProps {
  title: string
  note?: ReactNode
  /** The same data as a table; always reachable, whatever the drawing needs. */
  table: ReactNode
  /** File name of the drawing; without one there is no download (a canvas, for instance). */
  file?: string
  actions?: ReactNode
  children: ReactNode
}

/** A chart with the table behind it and its drawing as a file. */
export function ChartFrame({ title, note, table, file, actions, children }: ChartFrameProps) {
  const [asTable, setAsTable] = useState(false)
  const body = useRef<HTMLDivElement>(null)
  const download = () => {
    const drawings = [...(body.current?.querySelectorAll<SVGSVGElement>('svg[data-chart]') ?? [])]
    if (drawings.length > 0) saveFile(`${file}.svg`, standaloneSvg(drawings), 'image/svg+xml')
  }
  return (
    <figure className="min-w-0">
      <figcaption className="flex items-center gap-1">
        <div className="min-w-0 flex-1">
          <span className="font-medium">{title}</span>
          {note && <span className="ml-2 text-xs text-soft">{note}</span>}
        </div>
        {actions}
        {file && !asTable && (
          <IconButton label={`Save “${title}” as SVG`} onClick={download}>
            <Download size={14} aria-hidden />
          </IconButton>
        )}
        <IconButton
          label={asTable ? `Show “${title}” as a drawing` : `Show “${title}” as a table`}
          aria-pressed={asTable}
          onClick={() => setAsTable(!asTable)}
        >
          {asTable ? <ChartLine size={14} aria-hidden /> : <Table2 size={14} aria-hidden />}
        </IconButton>
      </figcaption>
      <div ref={body} className="overflow-x-clip">
        {asTable ? <div className="max-h-80 overflow-y-auto">{table}</div> : children}
      </div>
    </figure>
  )
}
