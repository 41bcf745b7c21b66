import { useEffect, useRef } from 'react'
import { useVirtualizer } from '@tanstack/react-virtual'
import { type ShortlistRow } from '../../../shared/shortlists.ts'
import { ClassThumb } from '../../components/geometry/ClassThumb.tsx'
import { Outcome, type OutcomeFormat } from '../../components/ui/Outcome.tsx'
import { VerdictMark } from '../../components/ui/VerdictMark.tsx'
import { useWidth } from '../../lib/useWidth.ts'
import { type Selection } from './useSelection.ts'

const leastWidth = 216
const cardHeight = 168
const gap = 8

interface PictureGridProps {
  rows: readonly ShortlistRow[]
  /** Place of the row in hand. */
  at: number
  /** Whether the row in hand was chosen, so that it is kept in view. */
  follow: boolean
  selection: Selection
  version: number
  twoReaders: boolean
  format: OutcomeFormat
  onCurrent: (key: string) => void
  /** Told how many stand side by side, for the arrow keys. */
  onAbreast: (count: number) => void
}

/** The rows as pictures of their largest 2-faces, several abreast; only those in view are drawn. */
export function PictureGrid({
  rows,
  at,
  follow,
  selection,
  version,
  twoReaders,
  format,
  onCurrent,
  onAbreast,
}: PictureGridProps) {
  'use no memo'
  const [frame, width] = useWidth<HTMLDivElement>(900)
  const scroller = useRef<HTMLDivElement>(null)
  const abreast = Math.max(1, Math.floor((width + gap) / (leastWidth + gap)))
  useEffect(() => onAbreast(abreast), [onAbreast, abreast])
  const lines = Math.ceil(rows.length / abreast)
  const virtualizer = useVirtualizer({
    count: lines,
    getScrollElement: () => scroller.current,
    estimateSize: () => cardHeight + gap,
    overscan: 2,
    initialRect: { width: 800, height: 600 },
  })
  const line = Math.floor(at / abreast)
  useEffect(() => {
    if (follow && line < lines) virtualizer.scrollToIndex(line)
  }, [virtualizer, follow, line, lines])
  return (
    <div ref={frame}>
      <div
        ref={scroller}
        tabIndex={0}
        role="group"
        aria-label="Pictures of the candidates, scrolls"
        className="max-h-[62vh] overflow-auto"
      >
        <ul
          aria-label="Candidates as pictures"
          className="relative"
          style={{ height: virtualizer.getTotalSize() }}
        >
          {virtualizer.getVirtualItems().flatMap(({ index, start }) =>
            rows.slice(index * abreast, (index + 1) * abreast).map((row, column) => {
              const place = index * abreast + column
              return (
                <li
                  key={row.candidateKey}
                  aria-current={place === at || undefined}
                  aria-posinset={place + 1}
                  aria-setsize={rows.length}
                  className={`absolute flex flex-col overflow-hidden rounded border px-2 py-1.5 ${place === at ? 'border-action bg-action-wash shadow-[inset_3px_0_0_var(--action)]' : 'hover:bg-action-wash'}`}
                  style={{
                    top: start,
                    left: `calc(${column} * (100% + ${gap}px) / ${abreast})`,
                    width: `calc((100% - ${(abreast - 1) * gap}px) / ${abreast})`,
                    height: cardHeight,
                  }}
                  onClick={(event) => {
                    if (!(event.target instanceof Element && event.target.closest('a, button, input')))
                      onCurrent(row.candidateKey)
                  }}
                >
                  <div className="flex items-center gap-2">
                    <input
                      type="checkbox"
                      aria-label={`Select rank ${row.rank}`}
                      checked={selection.has(row.candidateKey)}
                      onChange={(event) =>
                        selection.toggle(
                          row.candidateKey,
                          event.nativeEvent instanceof MouseEvent && event.nativeEvent.shiftKey,
                        )
                      }
                    />
                    <span className="font-medium tabular-nums">{row.rank}</span>
                    <span className="ml-auto text-found">
                      <Outcome outcome={row.outcome} decimals={format.score} />
                    </span>
                  </div>
                  <div className="flex min-h-0 flex-1 items-center justify-center">
                    <ClassThumb candidate={row.candidateKey} height={92} width={leastWidth - 24} />
                  </div>
                  <div className="flex items-center gap-2 overflow-hidden text-xs">
                    <VerdictMark verdict={row.verdict} version={version} twoReaders={twoReaders} />
                    <span className="ml-auto truncate text-soft" title={row.polytopeName}>
                      {row.polytopeName}
                    </span>
                  </div>
                </li>
              )
            }),
          )}
        </ul>
      </div>
    </div>
  )
}
