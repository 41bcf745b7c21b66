import { In, IsNull, type EntityManager } from 'typeorm'
import { may, type Role } from '../../shared/roles.ts'
import type { CommentView, MentionView, WriteComment } from '../../shared/comments.ts'
import type { ServerContext } from '../context.ts'
import { Comment } from '../entities/comment.ts'
import { Membership } from '../entities/membership.ts'
import { Mention } from '../entities/mention.ts'
import { conflict, notAllowed, notFound } from '../problems.ts'
import { presentComment } from '../presenters/comments.ts'
import { readCampaignCandidate } from './candidates.ts'

const withPeople = { author: true, removedBy: true } as const

/** Oldest first. */
export async function listComments(
  manager: EntityManager,
  campaignId: string,
  candidateKey: string,
): Promise<CommentView[]> {
  await readCampaignCandidate(manager, campaignId, candidateKey)
  const comments = await manager.find(Comment, {
    where: { campaignId, candidateKey },
    relations: withPeople,
    order: { id: 'ASC' },
  })
  const mentions = await mentionsOf(
    manager,
    comments.map(({ id }) => id),
  )
  return comments.map((comment) => presentComment(comment, mentions.get(comment.id) ?? []))
}

export async function writeComment(
  { source, writes, streams }: ServerContext,
  place: { campaignId: string; candidateKey: string },
  authorId: string,
  input: WriteComment,
): Promise<CommentView> {
  await readCampaignCandidate(source.manager, place.campaignId, place.candidateKey)
  const id = await writes.transaction(async (manager) => {
    const createdAt = new Date().toISOString()
    const inserted = await manager.insert(Comment, { ...place, authorId, text: input.text, createdAt })
    const commentId = Number(inserted.identifiers[0]?.id)
    await mention(manager, place.campaignId, commentId, authorId, input)
    return commentId
  })
  streams.toCampaign(place.campaignId, { kind: 'comment', candidateKey: place.candidateKey })
  return readComment(source.manager, id)
}

/** Only the author's own words can be changed; who was mentioned before and still is has seen it or not, as before. */
export async function editComment(
  { source, writes, streams }: ServerContext,
  campaignId: string,
  id: number,
  accountId: string,
  input: WriteComment,
): Promise<CommentView> {
  const candidateKey = await writes.transaction(async (manager) => {
    const comment = await findComment(manager, campaignId, id)
    if (comment.authorId !== accountId) throw notAllowed('Only its author can change a comment.')
    if (comment.removedAt !== null) throw conflict('comment-removed', 'The comment has been removed.')
    await manager.update(Comment, { id }, { text: input.text, editedAt: new Date().toISOString() })
    await mention(manager, campaignId, id, comment.authorId, input)
    return comment.candidateKey
  })
  streams.toCampaign(campaignId, { kind: 'comment', candidateKey })
  return readComment(source.manager, id)
}

/** By its author or a lead. The words go, a line stays. */
export async function removeComment(
  { writes, streams }: ServerContext,
  campaign: { id: string; role: Role },
  id: number,
  accountId: string,
): Promise<void> {
  const candidateKey = await writes.transaction(async (manager) => {
    const comment = await findComment(manager, campaign.id, id)
    if (comment.authorId !== accountId && !may(campaign.role, 'campaign.edit')) {
      throw notAllowed('Only its author or a lead can remove a comment.')
    }
    if (comment.removedAt !== null) return comment.candidateKey
    await manager.delete(Mention, { commentId: id })
    const removedAt = new Date().toISOString()
    await manager.update(Comment, { id }, { text: '', removedAt, removedById: accountId })
    return comment.candidateKey
  })
  streams.toCampaign(campaign.id, { kind: 'comment', candidateKey })
}

/** What waits for a person in a campaign, newest first. */
export async function listMentions(
  manager: EntityManager,
  campaignId: string,
  accountId: string,
): Promise<MentionView[]> {
  const mentions = await manager.find(Mention, {
    where: { accountId, seenAt: IsNull(), comment: { campaignId } },
    relations: { comment: { author: true } },
    order: { commentId: 'DESC' },
    take: 50,
  })
  return mentions.flatMap(({ commentId, comment }) =>
    comment
      ? [
          {
            commentId,
            candidateKey: comment.candidateKey,
            author: comment.author?.name ?? '',
            text: comment.text,
            createdAt: comment.createdAt,
          },
        ]
      : [],
  )
}

export async function markMentionSeen(
  { writes }: ServerContext,
  campaignId: string,
  id: number,
  accountId: string,
): Promise<void> {
  await writes.transaction(async (manager) => {
    await findComment(manager, campaignId, id)
    const one = { commentId: id, accountId, seenAt: IsNull() }
    await manager.update(Mention, one, { seenAt: new Date().toISOString() })
  })
}

async function findComment(manager: EntityManager, campaignId: string, id: number): Promise<Comment> {
  const comment = Number.isSafeInteger(id) ? await manager.findOneBy(Comment, { id, campaignId }) : null
  if (comment === null) throw notFound('comment')
  return comment
}

async function readComment(manager: EntityManager, id: number): Promise<CommentView> {
  const comment = await manager.findOneOrFail(Comment, { where: { id }, relations: withPeople })
  return presentComment(comment, (await mentionsOf(manager, [id])).get(id) ?? [])
}

async function mentionsOf(manager: EntityManager, ids: readonly number[]): Promise<Map<number, Mention[]>> {
  const found = await manager.find(Mention, {
    where: { commentId: In([...ids]) },
    relations: { account: true },
  })
  const byComment = new Map<number, Mention[]>()
  for (const one of found) byComment.set(one.commentId, [...(byComment.get(one.commentId) ?? []), one])
  return byComment
}

/** Sets who is mentioned: members that are named in the text, but for the author. */
async function mention(
  manager: EntityManager,
  campaignId: string,
  commentId: number,
  authorId: string,
  { text, mentions }: WriteComment,
): Promise<void> {
  const members = await manager.find(Membership, {
    where: { campaignId, accountId: In([...mentions]) },
    relations: { account: true },
  })
  const named = members
    .filter(({ accountId, account }) => accountId !== authorId && text.includes(`@${account?.name ?? ''}`))
    .map(({ accountId }) => accountId)
  const before = await manager.findBy(Mention, { commentId })
  for (const { accountId } of before) {
    if (!named.includes(accountId)) await manager.delete(Mention, { commentId, accountId })
  }
  for (const accountId of named) {
    if (!before.some((one) => one.accountId === accountId)) {
      await manager.insert(Mention, { commentId, accountId, seenAt: null })
    }
  }
}
