import { useMemo } from 'react'
import { useQuery } from '@tanstack/react-query'
import { classPictureQuery } from '../../api/classPictures.ts'
import { drawingOf } from './faceDrawing.ts'
import { FacePicture } from './FacePicture.tsx'

const boxHeight = 28

/** The largest 2-faces of a candidate in the height of a table row: enough to tell neighbours apart. */
export function ClassThumb({ candidate }: { candidate: string }) {
  const picture = useQuery(classPictureQuery(candidate))
  const faces = useMemo(
    () => picture.data?.faces.map((face) => drawingOf(face, face.index, face.triangles)),
    [picture.data],
  )
  if (picture.isError) return <span className="text-soft">–</span>
  if (!picture.data || !faces)
    return <span className="inline-block h-6 w-20 animate-pulse bg-null-wash" aria-hidden />
  return (
    <span className="inline-flex h-7 w-48 items-center gap-1 overflow-hidden align-middle" aria-hidden>
      {faces.map((face) => (
        <FacePicture
          key={face.index}
          face={face}
          unit={Math.min(10, (boxHeight - 6) / Math.max(1, face.height), 84 / Math.max(1, face.width))}
          margin={3}
          plain
          lengths={picture.data.dualLengths}
        />
      ))}
    </span>
  )
}
