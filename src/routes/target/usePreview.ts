import { useCallback, useEffect, useMemo, useRef } from 'react'
import { keepPreviousData, useQuery, useQueryClient } from '@tanstack/react-query'
import { type Scope } from '../../../shared/polytopes.ts'
import { type Preview } from '../../../shared/targets.ts'
import { scopeQuery } from '../../api/polytopes.ts'
import { previewKey, previewQuery, startPreview, stopPreview } from '../../api/previews.ts'
import { isEmptyScope } from '../../components/scope/ScopeFields.tsx'
import { useDelayed } from '../../lib/useDelayed.ts'

export interface PreviewAsk {
  /** The rule's canonical text: comments and layout ask nothing anew. Null while the rule has an error. */
  rule: string | null
  scope: Scope
  size: number
  seed: number
}

export interface PreviewState {
  /** Latest state known, of this ask or, while `outdated`, of the last one. */
  preview: Preview | null
  outdated: boolean
  starting: boolean
  /** Nothing is asked while no polytope is in the scope; counts again. */
  countAgain: (() => unknown) | null
  error: unknown
  retry: () => void
}

/** After the checker's own pause. */
const typingPause = 200

/** States of one preview only grow; an older state that arrives late is dropped. */
export function newerState(known: Preview | undefined, next: Preview): Preview {
  if (!known) return next
  return known.state !== 'running' || known.evaluated > next.evaluated ? known : next
}

/**
 * The live answer to a rule: asks after a pause in typing, stops what is outdated on the server, and follows the states
 * that the event stream brings. A rule with an error keeps the last answer.
 */
export function usePreview(campaign: string, { rule, scope, size, seed }: PreviewAsk): PreviewState {
  const client = useQueryClient()
  const sound = rule !== null
  const wanted = sound ? JSON.stringify({ text: rule, scope, size, seed }) : ''
  const settled = useDelayed(wanted, typingPause)
  const counted = useDelayed(scope, typingPause)
  const count = useQuery({ ...scopeQuery(campaign, counted), enabled: !isEmptyScope(counted) })
  const isVoid = count.data?.count === 0
  const ready =
    sound && settled === wanted && !isEmptyScope(scope) && (count.isError || (count.isSuccess && !isVoid))

  const start = useQuery({
    queryKey: ['preview-start', campaign, settled],
    queryFn: async ({ signal }) => {
      const body = JSON.parse(settled) as Parameters<typeof startPreview>[1]
      const first = await startPreview(campaign, body, signal)
      client.setQueryData<Preview>(previewKey(first.id), (known) => newerState(known, first))
      return first.id
    },
    enabled: ready,
    placeholderData: keepPreviousData,
    staleTime: Infinity,
    gcTime: 0,
    retry: false,
  })
  const id = start.data ?? null
  const { data } = useQuery(previewQuery(id))
  const outdated = data !== undefined && (start.isPlaceholderData || settled !== wanted || !sound)

  const stopped = useRef<string | null>(null)
  const running = data?.state === 'running' ? id : null
  useEffect(() => {
    if (running === null || !outdated || stopped.current === running) return
    stopped.current = running
    // The next preview replaces it in any case.
    stopPreview(campaign).catch(() => {})
  }, [campaign, running, outdated])
  const stillRunning = useRef(false)
  useEffect(() => {
    stillRunning.current = running !== null
  }, [running])
  useEffect(
    () => () => {
      if (stillRunning.current) stopPreview(campaign).catch(() => {})
    },
    [campaign],
  )

  const { refetch } = start
  // Stopped by a change that was taken back; or of two requests sent in haste the server took the older one last.
  const replaced = data?.state === 'replaced' && ready && !start.isPlaceholderData && !start.isFetching
  const askedAgain = useRef('')
  useEffect(() => {
    if (!replaced || (askedAgain.current === settled && stopped.current !== id)) return
    askedAgain.current = settled
    stopped.current = null
    void refetch()
  }, [replaced, settled, id, refetch])
  const retry = useCallback(() => void refetch(), [refetch])
  const error = ready && start.isError ? start.error : null
  const countAgain = isVoid ? count.refetch : null
  return useMemo(
    () => ({ preview: data ?? null, outdated, starting: start.isFetching, countAgain, error, retry }),
    [data, outdated, start.isFetching, countAgain, error, retry],
  )
}
