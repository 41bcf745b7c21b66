import { useMutation, useQueryClient, type QueryClient } from '@tanstack/react-query'
import { type z } from 'zod'
import {
  byOneReader,
  standingOf,
  verdictSchema,
  verdictsGivenSchema,
  type GiveVerdicts,
  type giveVerdictSchema,
  type Verdict,
  type VerdictsGiven,
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

/** Answers and events come in no certain order; the numbers of verdicts count up. One on its way gives place to any. */
const newer = (known: Verdict | null, verdict: Verdict): Verdict =>
  !known || onItsWay(known) || Number(verdict.id) >= Number(known.id) ? verdict : known

const onItsWay = ({ id }: Verdict) => id.startsWith('sent ')

/** Verdicts that are shown before the server has answered. */
export interface SentVerdicts {
  /** Takes those back that are still shown, for some candidates. */
  takeBack(candidateKeys: readonly string[]): void
}

let sent = 0

/** Shows verdicts at once, in the lists of their target; the answer replaces them. */
export function showSent(
  client: QueryClient,
  candidateKeys: readonly string[],
  draft: (before: Verdict | null) => Omit<Verdict, 'id'>,
): SentVerdicts {
  sent += 1
  const id = `sent ${sent}`
  const before = new Map<string, Map<string, Verdict | null>>()
  const keys = new Set(candidateKeys)
  client.setQueriesData<ShortlistDetail>({ queryKey: ['shortlist'] }, (list) => {
    if (!list) return list
    const known = new Map<string, Verdict | null>()
    const rows = list.rows.map((row) => {
      if (!keys.has(row.candidateKey)) return row
      const verdict = { ...draft(row.verdict), id }
      if (verdict.targetId !== list.targetId) return row
      known.set(row.candidateKey, row.verdict)
      return { ...row, verdict }
    })
    before.set(list.id, known)
    return known.size > 0 ? { ...list, rows, ...tallyOf(rows) } : list
  })
  return {
    takeBack(refused) {
      const gone = new Set(refused)
      client.setQueriesData<ShortlistDetail>({ queryKey: ['shortlist'] }, (list) => {
        const known = list && before.get(list.id)
        if (!list || !known) return list
        const rows = list.rows.map((row) =>
          gone.has(row.candidateKey) && row.verdict?.id === id
            ? { ...row, verdict: known.get(row.candidateKey) ?? null }
            : row,
        )
        return { ...list, rows, ...tallyOf(rows) }
      })
    },
  }
}

/** One word on candidates of a target; refusals of single candidates are in the answer. */
export async function sendVerdicts(campaign: string, body: GiveVerdicts): Promise<VerdictsGiven> {
  const { candidateKeys, ...word } = body
  const [only] = candidateKeys
  if (candidateKeys.length > 1 || only === undefined) {
    return request(`/campaigns/${campaign}/verdicts`, { method: 'POST', body, schema: verdictsGivenSchema })
  }
  const verdict = await request(`/campaigns/${campaign}/candidates/${only}/verdicts`, {
    method: 'POST',
    body: word,
    schema: verdictSchema,
  })
  return { given: [{ candidateKey: only, verdict }], refused: [] }
}

export const undoVerdicts = (campaign: string, ids: readonly string[]): Promise<VerdictsGiven> =>
  request(`/campaigns/${campaign}/verdicts/undo`, {
    method: 'POST',
    body: { ids },
    schema: verdictsGivenSchema,
  })

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
