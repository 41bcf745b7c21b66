import { useCallback, useEffect, useRef } from 'react'
import { keepPreviousData, useQuery, useQueryClient } from '@tanstack/react-query'
import { type Scope } from '../../../shared/polytopes.ts'
import { type Preview } from '../../../shared/targets.ts'
import { previewKey, previewQuery, startPreview } from '../../api/previews.ts'
import { isEmptyScope } from '../../components/scope/ScopeFields.tsx'
import { useDelayed } from '../../lib/useDelayed.ts'

export interface PreviewAsk {
  text: string
  scope: Scope
  size: number
  seed: number
}

export interface PreviewState {
  /** Latest state known, of this ask or, while `outdated`, of the last one. */
  preview: Preview | null
  outdated: boolean
  starting: boolean
  error: unknown
  retry: () => void
}

const typingPause = 500

/** The rule without comments and blank lines: what a preview depends on, so that a comment asks nothing anew. */
const withoutComment = (line: string) => line.replace(/^((?:[^#"]|"(?:[^"\\]|\\.)*")*)#.*$/, '$1')

export const essence = (text: string) =>
  text
    .split('\n')
    .map((line) => withoutComment(line).trim())
    .filter(Boolean)
    .join('\n')

/** States of one preview only grow; an older state that arrives late is dropped. */
export function newerState(known: Preview | undefined, next: Preview): Preview {
  if (!known) return next
  return known.state !== 'running' || known.evaluated > next.evaluated ? known : next
}

/**
 * The live answer to a rule: asks after a pause in typing, drops what is outdated, and follows the states that
 * the event stream brings. `sound` is whether the checker has no error; an unsound rule keeps the last answer.
 */
export function usePreview(campaign: string, ask: PreviewAsk, sound: boolean): PreviewState {
  const client = useQueryClient()
  const wanted = JSON.stringify({ ...ask, text: essence(ask.text) })
  const settled = useDelayed(wanted, typingPause)
  const ready = sound && settled === wanted && !isEmptyScope(ask.scope)

  const start = useQuery({
    queryKey: ['preview-start', campaign, settled],
    queryFn: async ({ signal }) => {
      const first = await startPreview(campaign, JSON.parse(settled) as PreviewAsk, signal)
      client.setQueryData<Preview>(previewKey(first.id), (known) => newerState(known, first))
      return first.id
    },
    enabled: ready,
    placeholderData: keepPreviousData,
    staleTime: Infinity,
    gcTime: 0,
    retry: false,
  })
  const { data } = useQuery(previewQuery(start.data ?? null))
  const { refetch } = start
  // Of two requests sent in haste the server may have taken the older one last; then this one is asked once more.
  const replaced = data?.state === 'replaced' && ready && !start.isPlaceholderData
  const askedAgain = useRef('')
  useEffect(() => {
    if (!replaced || askedAgain.current === settled) return
    askedAgain.current = settled
    void refetch()
  }, [replaced, settled, refetch])
  const retry = useCallback(() => void refetch(), [refetch])
  return {
    preview: data ?? null,
    outdated: data !== undefined && (start.isPlaceholderData || settled !== wanted || !sound),
    starting: start.isFetching,
    error: ready && start.isError ? start.error : null,
    retry,
  }
}
