import { queryOptions, useMutation, useQuery, useQueryClient, type QueryClient } from '@tanstack/react-query'
import { type z } from 'zod'
import { sessionSchema, type setUpAccountSchema, type signInSchema } from '../../shared/session.ts'
import { request } from './request.ts'

export const sessionKey = ['session'] as const

export const sessionQuery = () =>
  queryOptions({
    queryKey: sessionKey,
    queryFn: ({ signal }) => request('/session', { schema: sessionSchema, signal }),
    staleTime: 60_000,
  })

export function useSession() {
  return useQuery(sessionQuery())
}

export function useSignIn() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: z.infer<typeof signInSchema>) =>
      request('/session', { method: 'POST', body, schema: sessionSchema }),
    onSuccess: (session) => {
      client.clear()
      client.setQueryData(sessionKey, session)
    },
  })
}

export function useSignOut() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: () => request('/session', { method: 'DELETE' }),
    onSuccess: () => {
      const version = client.getQueryData<{ version: string }>(sessionKey)?.version ?? ''
      client.setQueryData(sessionKey, { account: null, version })
    },
  })
}

/** Drops what a signed-out person's pages had loaded; for the pages before sign-in, when none of those is open. */
export function forgetEverything(client: QueryClient): void {
  client.removeQueries({ predicate: (query) => query.queryKey[0] !== sessionKey[0] })
}

/** The one-time link of a new account: choose name and password; signs in. */
export function useSetUpAccount() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: z.infer<typeof setUpAccountSchema>) =>
      request('/setup', { method: 'POST', body, schema: sessionSchema }),
    onSuccess: (session) => {
      client.clear()
      client.setQueryData(sessionKey, session)
    },
  })
}
