import { MutationCache, QueryCache, QueryClient } from '@tanstack/react-query'
import { ApiError, ContractError } from './request.ts'
import { sessionKey } from './session.ts'

/** The cache of a tab. Any 401 marks the session as over, which brings up the sign-in page. */
export function createQueryClient(): QueryClient {
  const noticeSignedOut = (error: unknown) => {
    if (error instanceof ApiError && error.status === 401) {
      void client.invalidateQueries({ queryKey: sessionKey })
    }
  }
  const client: QueryClient = new QueryClient({
    queryCache: new QueryCache({ onError: noticeSignedOut }),
    mutationCache: new MutationCache({ onError: noticeSignedOut }),
    defaultOptions: {
      queries: {
        staleTime: 15_000,
        retry: (failures, error) =>
          failures < 2 &&
          !(error instanceof ContractError) &&
          !(error instanceof ApiError && error.status < 500),
      },
    },
  })
  return client
}
