import { useEffect, useState } from 'react'
import { useLocation } from 'react-router-dom'
import { useQuery } from '@tanstack/react-query'
import { toast } from 'sonner'
import { type CommentView } from '../../../shared/comments.ts'
import { may } from '../../../shared/roles.ts'
import { useCampaign } from '../../api/campaigns.ts'
import {
  commentsQuery,
  mentionsQuery,
  useEditComment,
  useMarkMentionSeen,
  useRemoveComment,
  useWriteComment,
} from '../../api/comments.ts'
import { explain } from '../../api/request.ts'
import { useSession } from '../../api/session.ts'
import { CommentBox } from '../../components/comment/CommentBox.tsx'
import { CommentText } from '../../components/comment/CommentText.tsx'
import { useBarred } from '../../components/shell/currentCampaign.tsx'
import { Button } from '../../components/ui/Button.tsx'
import { ConfirmDialog } from '../../components/ui/ConfirmDialog.tsx'
import { Section } from '../../components/ui/Layout.tsx'
import { QueryView } from '../../components/ui/States.tsx'
import { formatTime } from '../../lib/numbers.ts'
import { useSeen } from '../../lib/useSeen.ts'

interface Place {
  campaign: string
  candidate: string
}

/** What members of the campaign say about the candidate. */
export function CommentSection({ campaign, candidate }: Place) {
  const [place, seen] = useSeen()
  const { hash } = useLocation()
  const wanted = hash.startsWith('#comment')
  const comments = useQuery({ ...commentsQuery(campaign, candidate), enabled: seen || wanted })
  const there = comments.data !== undefined
  // The comment an address names comes after the page: the browser could not go to it.
  useEffect(() => {
    if (there && wanted) document.getElementById(hash.slice(1))?.scrollIntoView()
  }, [there, wanted, hash])
  const members = useCampaign(campaign).data?.members ?? []
  const barred = useBarred('comments.write')
  const write = useWriteComment(campaign, candidate)
  useMarkAsSeen(campaign, candidate, comments.data)
  return (
    <div ref={place}>
      <Section id="comments" title="Comments" note="Read by members of this campaign only.">
        {(seen || wanted) && (
          <QueryView query={comments} what="the comments">
            {(list) => (
              <ol aria-label="Comments, oldest first" className="mb-4 empty:hidden">
                {list.map((comment) => (
                  <Comment key={comment.id} {...{ campaign, candidate, comment, members }} />
                ))}
              </ol>
            )}
          </QueryView>
        )}
        <div className="print:hidden">
          <CommentBox
            label="New comment"
            members={members}
            send="Comment"
            busy={write.isPending}
            unavailable={barred}
            onSend={(text, mentions, done) =>
              write.mutate(
                { text, mentions },
                { onSuccess: done, onError: (error) => void toast.error(explain(error)) },
              )
            }
          />
        </div>
      </Section>
    </div>
  )
}

/** Mentions of the reader in comments that are on the page have been seen. */
function useMarkAsSeen(campaign: string, candidate: string, comments: readonly CommentView[] | undefined) {
  const mentions = useQuery({ ...mentionsQuery(campaign), enabled: comments !== undefined })
  const { mutate } = useMarkMentionSeen(campaign)
  const waiting = mentions.data?.filter(
    (mention) => mention.candidateKey === candidate && comments?.some(({ id }) => id === mention.commentId),
  )
  const ids = waiting?.map(({ commentId }) => commentId).join(' ') ?? ''
  useEffect(() => {
    for (const id of ids.split(' ').filter(Boolean)) mutate(Number(id))
  }, [ids, mutate])
}

function Comment({
  campaign,
  candidate,
  comment,
  members,
}: Place & { comment: CommentView; members: readonly { accountId: string; name: string }[] }) {
  const me = useSession().data?.account?.id
  const role = useCampaign(campaign).data?.role
  const [editing, setEditing] = useState(false)
  const [removing, setRemoving] = useState(false)
  const edit = useEditComment(campaign, candidate)
  const remove = useRemoveComment(campaign, candidate)
  const { id, author, authorId, text, mentions, createdAt, editedAt, removed } = comment
  const isMine = authorId === me && may(role, 'comments.write')
  if (removed) {
    return (
      <li id={`comment-${id}`} className="border-b py-2 text-soft last:border-b-0">
        A comment of {author} was removed{removed.by !== author && ` by ${removed.by}`},{' '}
        {formatTime(removed.at)}.
      </li>
    )
  }
  return (
    <li id={`comment-${id}`} className="scroll-mt-16 border-b py-2 last:border-b-0">
      <p className="flex flex-wrap items-center gap-x-3">
        <span className="font-medium">{author}</span>
        <span className="text-soft">{formatTime(createdAt)}</span>
        {editedAt && (
          <span className="text-soft" title={formatTime(editedAt)}>
            edited
          </span>
        )}
        <span className="ml-auto flex print:hidden">
          {isMine && !editing && (
            <Button kind="quiet" onClick={() => setEditing(true)}>
              Edit
            </Button>
          )}
          {(isMine || may(role, 'campaign.edit')) && (
            <Button kind="quiet" onClick={() => setRemoving(true)}>
              Remove
            </Button>
          )}
        </span>
      </p>
      {editing ? (
        <CommentBox
          label="Comment"
          members={members}
          initial={text}
          send="Save"
          busy={edit.isPending}
          onCancel={() => setEditing(false)}
          onSend={(next, named) =>
            edit.mutate(
              { id, text: next, mentions: named },
              {
                onSuccess: () => setEditing(false),
                onError: (error) => void toast.error(explain(error)),
              },
            )
          }
        />
      ) : (
        <CommentText text={text} names={mentions.map(({ name }) => name)} />
      )}
      <ConfirmDialog
        open={removing}
        onOpenChange={setRemoving}
        title="Remove this comment?"
        word="Remove"
        onConfirm={() => remove.mutate(id, { onError: (error) => void toast.error(explain(error)) })}
      >
        Its words cannot be brought back. A line stays that says it was there.
      </ConfirmDialog>
    </li>
  )
}
