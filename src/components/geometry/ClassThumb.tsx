import { useMemo } from 'react'
import { useQuery } from '@tanstack/react-query'
import { candidateQuery } from '../../api/candidates.ts'
import { dualLengthsOf, drawingsOf } from './faceDrawing.ts'
import { FacePicture } from './FacePicture.tsx'

const boxHeight = 28

/** The largest 2-faces of a candidate in the height of a table row: enough to tell neighbours apart. */
export function ClassThumb({ candidate }: { candidate: string }) {
  const geometry = useQuery(candidateQuery(candidate))
  const faces = useMemo(
    () =>
      geometry.data
        ? drawingsOf(geometry.data.polytope.twoFaces, geometry.data.triangles, geometry.data.faceOf)
        : null,
    [geometry.data],
  )
  if (geometry.isError) return <span className="text-soft">–</span>
  if (!faces) return <span className="inline-block h-6 w-20 animate-pulse bg-null-wash" aria-hidden />
  const lengths = dualLengthsOf(faces)
  return (
    <span className="inline-flex h-7 w-48 items-center gap-1 overflow-hidden align-middle" aria-hidden>
      {faces.slice(0, 2).map((face) => (
        <FacePicture
          key={face.index}
          face={face}
          unit={Math.min(10, (boxHeight - 6) / Math.max(1, face.height), 84 / Math.max(1, face.width))}
          margin={3}
          plain
          lengths={lengths}
        />
      ))}
    </span>
  )
}
