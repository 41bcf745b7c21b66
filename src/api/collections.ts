import { queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query'
import { z } from 'zod'
import {
  collectionSchema,
  membersChangedSchema,
  type createCollectionSchema,
  type editCollectionSchema,
} from '../../shared/collections.ts'
import { type Scope } from '../../shared/polytopes.ts'
import { request } from './request.ts'

export const collectionsQuery = (campaign?: string) =>
  queryOptions({
    queryKey: ['collections', campaign ?? ''] as const,
    queryFn: ({ signal }) =>
      request('/collections', { schema: z.array(collectionSchema), query: { campaign }, signal }),
    staleTime: 60_000,
  })

export const useCollections = (campaign?: string) => useQuery(collectionsQuery(campaign))

/** A change shows in the lists, and in whatever was filtered by a collection. */
function useCollectionChange<Input, Output>(send: (input: Input) => Promise<Output>) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: send,
    onSuccess: () => {
      void client.invalidateQueries({ queryKey: ['collections'] })
      void client.invalidateQueries({ queryKey: ['polytopes'] })
    },
  })
}

const base = (campaign: string) => `/campaigns/${campaign}/collections`

export const useCreateCollection = (campaign: string) =>
  useCollectionChange((body: z.input<typeof createCollectionSchema>) =>
    request(base(campaign), { method: 'POST', body, schema: collectionSchema }),
  )

export const useEditCollection = (campaign: string) =>
  useCollectionChange(({ id, ...body }: z.input<typeof editCollectionSchema> & { id: string }) =>
    request(`${base(campaign)}/${id}`, { method: 'PATCH', body, schema: collectionSchema }),
  )

export const useDeleteCollection = (campaign: string) =>
  useCollectionChange((id: string) => request(`${base(campaign)}/${id}`, { method: 'DELETE' }))

export const useChangeMembers = (campaign: string) =>
  useCollectionChange(({ id, into, scope }: { id: string; into: boolean; scope: Scope }) =>
    request(`${base(campaign)}/${id}/${into ? 'add' : 'remove'}`, {
      method: 'POST',
      body: { scope },
      schema: membersChangedSchema,
    }),
  )

export const usePublishCollection = (campaign: string) =>
  useCollectionChange(({ id, published }: { id: string; published: boolean }) =>
    request(`${base(campaign)}/${id}/${published ? 'publish' : 'withdraw'}`, {
      method: 'POST',
      schema: collectionSchema,
    }),
  )
