import { Link } from 'react-router-dom'
import { useQuery } from '@tanstack/react-query'
import { mentionsQuery, useMarkMentionSeen } from '../../api/comments.ts'
import { Button } from '../../components/ui/Button.tsx'
import { Section } from '../../components/ui/Layout.tsx'
import { formatTime } from '../../lib/numbers.ts'

/** Comments that name the reader and that they have not seen; nothing where there are none. */
export function Mentions({ campaign }: { campaign: string }) {
  const mentions = useQuery(mentionsQuery(campaign)).data ?? []
  const seen = useMarkMentionSeen(campaign)
  if (mentions.length === 0) return null
  return (
    <Section margin title="Mentions" note="Comments that name you. They go once you have seen them there.">
      <ul aria-label="Comments that name you">
        {mentions.map(({ commentId, candidateKey, author, text, createdAt }) => (
          <li
            key={commentId}
            className="flex flex-wrap items-baseline gap-x-3 border-b py-1.5 last:border-b-0"
          >
            <Link
              to={`/candidates/${candidateKey}?campaign=${campaign}#comment-${commentId}`}
              className="font-mono text-xs text-action hover:underline"
            >
              {candidateKey.slice(0, 10)}
            </Link>
            <span className="font-medium">{author}</span>
            <span className="line-clamp-1 min-w-0 flex-1 basis-64 break-words">{text}</span>
            <span className="text-soft">{formatTime(createdAt)}</span>
            <Button kind="quiet" onClick={() => seen.mutate(commentId)}>
              Seen
            </Button>
          </li>
        ))}
      </ul>
    </Section>
  )
}
