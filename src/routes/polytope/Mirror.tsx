import { Link, useNavigate } from 'react-router-dom'
import { toast } from 'sonner'
import { type PolytopeDetail } from '../../../shared/polytopes.ts'
import { useImportText } from '../../api/polytopes.ts'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { explain } from '../../api/request.ts'

/** The way to the dual polytope, whose threefold is the mirror; imported from the facet normals when it is missing. */
export function Mirror({ polytope, campaign = '' }: { polytope: PolytopeDetail; campaign?: string }) {
  const { mirrorKey, key, h11, h21, name, facetNormals } = polytope
  const send = useImportText(campaign)
  const barred = useBarred('polytopes.import')
  const navigate = useNavigate()
  const suffix = campaign ? `?campaign=${campaign}` : ''
  if (mirrorKey === key) return <span>itself: the polytope is its own dual</span>
  if (mirrorKey !== null) {
    return (
      <Link className="text-action hover:underline" to={`/library/${mirrorKey}${suffix}`}>
        the dual polytope, ({h21}, {h11})
      </Link>
    )
  }
  const bring = () =>
    send.mutate(
      {
        text: facetNormals.map((normal) => normal.join(' ')).join('\n'),
        name: `mirror of ${name}`.slice(0, 80),
      },
      {
        onSuccess: ({ imported: [dual] }) => {
          if (dual) void navigate(`/library/${dual.key}${suffix}`)
        },
        onError: (error) => toast.error(explain(error)),
      },
    )
  return (
    <span className="inline-flex flex-wrap items-center gap-x-2">
      <span className="text-soft">
        ({h21}, {h11}), not in the library
      </span>
      <Button kind="quiet" unavailable={barred} busy={send.isPending} onClick={bring}>
        {send.isPending ? 'Importing…' : 'Import the mirror'}
      </Button>
    </span>
  )
}
