import { useMutation, useQueryClient, type QueryClient } from '@tanstack/react-query'
import { type z } from 'zod'
import { verdictSchema, type giveVerdictSchema, type Verdict } from '../../shared/verdicts.ts'
import { type ShortlistDetail } from '../../shared/shortlists.ts'
import { request } from './request.ts'

export type GiveVerdict = z.infer<typeof giveVerdictSchema> & { key: string }

/** Puts a verdict into every shortlist of its target that is in the cache, with its counts. */
export function placeVerdict(client: QueryClient, key: string, verdict: Verdict): void {
  client.setQueriesData<ShortlistDetail>({ queryKey: ['shortlist'] }, (list) => {
    if (!list || list.targetId !== verdict.targetId) return list
    const rows = list.rows.map((row) =>
      row.candidateKey === key && isNewer(verdict, row.verdict) ? { ...row, verdict } : row,
    )
    const count = (value: string) =>
      rows.filter((row) => (row.verdict?.value ?? 'undecided') === value).length
    return {
      ...list,
      rows,
      undecided: count('undecided'),
      verified: count('verified'),
      rejected: count('rejected'),
    }
  })
}

/** Answers and events come in no certain order; the numbers of verdicts count up. */
const isNewer = (verdict: Verdict, known: Verdict | null) => !known || Number(verdict.id) >= Number(known.id)

export function useGiveVerdict(campaign: string) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: ({ key, ...body }: GiveVerdict) =>
      request(`/campaigns/${campaign}/candidates/${key}/verdicts`, {
        method: 'POST',
        body,
        schema: verdictSchema,
      }),
    onSuccess: (verdict, { key }) => {
      placeVerdict(client, key, verdict)
      void client.invalidateQueries({ queryKey: ['candidate-record', campaign, key] })
      void client.invalidateQueries({ queryKey: ['campaign', campaign] })
      void client.invalidateQueries({ queryKey: ['shortlists', campaign] })
    },
  })
}
