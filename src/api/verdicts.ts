import { useMutation, useQueryClient, type QueryClient } from '@tanstack/react-query'
import { type z } from 'zod'
import {
  byOneReader,
  standingOf,
  verdictSchema,
  type giveVerdictSchema,
  type Verdict,
} from '../../shared/verdicts.ts'
import { type ShortlistDetail, type ShortlistRow } from '../../shared/shortlists.ts'
import { request } from './request.ts'

export type GiveVerdict = z.infer<typeof giveVerdictSchema> & { key: string }

/** Puts verdicts into every shortlist of their target that is in the cache, with its counts. */
export function placeVerdicts(
  client: QueryClient,
  placed: readonly { readonly candidateKey: string; readonly verdict: Verdict }[],
): void {
  const byKey = new Map<string, Verdict[]>()
  for (const { candidateKey, verdict } of placed) {
    byKey.set(candidateKey, [...(byKey.get(candidateKey) ?? []), verdict])
  }
  client.setQueriesData<ShortlistDetail>({ queryKey: ['shortlist'] }, (list) => {
    if (!list) return list
    let moved = false
    const rows = list.rows.map((row) => {
      const news = byKey.get(row.candidateKey)?.filter(({ targetId }) => targetId === list.targetId) ?? []
      const verdict = news.reduce(newer, row.verdict)
      if (verdict === row.verdict) return row
      moved = true
      return { ...row, verdict }
    })
    return moved ? { ...list, rows, ...tallyOf(rows) } : list
  })
}

/** Counts of a list by what stands for its rows. */
export function tallyOf(rows: readonly Pick<ShortlistRow, 'verdict'>[]) {
  const tally = { undecided: 0, verified: 0, rejected: 0, oneReader: 0 }
  for (const { verdict } of rows) {
    tally[standingOf(verdict)] += 1
    if (byOneReader(verdict)) tally.oneReader += 1
  }
  return tally
}

/** Answers and events come in no certain order; the numbers of verdicts count up. */
const newer = (known: Verdict | null, verdict: Verdict): Verdict =>
  !known || Number(verdict.id) >= Number(known.id) ? verdict : known

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
      placeVerdicts(client, [{ candidateKey: key, verdict }])
      void client.invalidateQueries({ queryKey: ['candidate-record', campaign, key] })
      void client.invalidateQueries({ queryKey: ['campaign', campaign] })
      void client.invalidateQueries({ queryKey: ['shortlists', campaign] })
    },
  })
}
