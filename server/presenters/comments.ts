import type { CommentView } from '../../shared/comments.ts'
import type { Comment } from '../entities/comment.ts'
import type { Mention } from '../entities/mention.ts'

/**
 * @param comment with author and who removed it loaded
 * @param mentions with account loaded
 */
export function presentComment(comment: Comment, mentions: readonly Mention[]): CommentView {
  return {
    id: comment.id,
    authorId: comment.authorId,
    author: comment.author?.name ?? '',
    text: comment.text,
    mentions: mentions.map(({ accountId, account }) => ({ accountId, name: account?.name ?? '' })),
    createdAt: comment.createdAt,
    editedAt: comment.editedAt,
    removed: comment.removedAt === null ? null : { at: comment.removedAt, by: comment.removedBy?.name ?? '' },
  }
}
