import { useEffect, useMemo, useState } from 'react'
import { useQuery } from '@tanstack/react-query'
import { classPictureQuery } from '../../api/classPictures.ts'
import { drawingOf } from './faceDrawing.ts'
import { FacePicture } from './FacePicture.tsx'

const rowHeight = 28

/** Milliseconds for which a row is there before its picture is drawn: not while one scrolls past it. */
const standingTime = 90

function useStanding(time: number): boolean {
  const [stands, setStands] = useState(false)
  useEffect(() => {
    const timer = setTimeout(() => setStands(true), time)
    return () => clearTimeout(timer)
  }, [time])
  return stands
}

/** The largest 2-faces of a candidate in the height of a table row: enough to tell neighbours apart. */
export function ClassThumb({
  candidate,
  height = rowHeight,
  width = 192,
}: {
  candidate: string
  /** Of the box that the faces are drawn into, in pixels. */
  height?: number
  width?: number
}) {
  const small = height <= rowHeight
  const stands = useStanding(standingTime)
  const picture = useQuery({ ...classPictureQuery(candidate), enabled: stands })
  const faces = useMemo(
    () => picture.data?.faces.map((face) => drawingOf(face, face.index, face.triangles)),
    [picture.data],
  )
  if (picture.isError) return <span className="text-soft">–</span>
  if (!picture.data || !faces || !stands)
    return (
      <span
        className="inline-block animate-pulse bg-null-wash"
        style={small ? { height: 24, width: 80 } : { height, width }}
        aria-hidden
      />
    )
  return (
    <span
      className={`inline-flex items-center gap-1 overflow-hidden align-middle ${small ? '' : 'justify-center'}`}
      style={{ height, width }}
      aria-hidden
    >
      {faces.map((face) => (
        <FacePicture
          key={face.index}
          face={face}
          unit={Math.min(
            small ? 10 : 26,
            (height - 6) / Math.max(1, face.height),
            (small ? 84 : width / Math.max(1, Math.min(2, faces.length)) - 10) / Math.max(1, face.width),
          )}
          margin={3}
          plain={small}
          lengths={picture.data.dualLengths}
        />
      ))}
    </span>
  )
}
