import { queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query'
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
      client.removeQueries({ predicate: (query) => query.queryKey[0] !== 'session' })
    },
  })
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
