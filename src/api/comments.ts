import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import { z } from 'zod'
import { commentSchema, mentionSchema, type WriteComment } from '../../shared/comments.ts'
import { request } from './request.ts'

export const commentsQuery = (campaign: string, candidate: string) =>
  queryOptions({
    queryKey: ['comments', campaign, candidate] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/candidates/${candidate}/comments`, {
        schema: z.array(commentSchema),
        signal,
      }),
  })

/** Comments that name the reader and wait for them. */
export const mentionsQuery = (campaign: string) =>
  queryOptions({
    queryKey: ['mentions', campaign] as const,
    queryFn: ({ signal }) =>
      request(`/campaigns/${campaign}/mentions`, { schema: z.array(mentionSchema), signal }),
  })

function useCommentChange<Input>(
  campaign: string,
  candidate: string,
  send: (input: Input) => Promise<unknown>,
) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: send,
    onSuccess: () => client.invalidateQueries({ queryKey: ['comments', campaign, candidate] }),
  })
}

export const useWriteComment = (campaign: string, candidate: string) =>
  useCommentChange(campaign, candidate, (body: WriteComment) =>
    request(`/campaigns/${campaign}/candidates/${candidate}/comments`, {
      method: 'POST',
      body,
      schema: commentSchema,
    }),
  )

export const useEditComment = (campaign: string, candidate: string) =>
  useCommentChange(campaign, candidate, ({ id, ...body }: WriteComment & { id: number }) =>
    request(`/campaigns/${campaign}/comments/${id}`, { method: 'PATCH', body, schema: commentSchema }),
  )

export const useRemoveComment = (campaign: string, candidate: string) =>
  useCommentChange(campaign, candidate, (id: number) =>
    request(`/campaigns/${campaign}/comments/${id}`, { method: 'DELETE' }),
  )

export function useMarkMentionSeen(campaign: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (commentId: number) =>
      request(`/campaigns/${campaign}/mentions/${commentId}/seen`, { method: 'POST' }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['mentions', campaign] }),
  })
}
