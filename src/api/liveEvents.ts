import { useEffect, useState } from 'react'
import { useQueryClient, type QueryClient } from '@tanstack/react-query'
import { type CampaignDetail } from '../../shared/campaigns.ts'
import { type z } from 'zod'
import { type hodgeCountsSchema } from '../../shared/polytopes.ts'
import { type PolytopeClasses } from '../../shared/polytopeStructure.ts'
import { type StreamEvent } from '../../shared/events.ts'
import { type Exploration } from '../../shared/explorations.ts'
import { type Certification } from '../../shared/certificates.ts'
import { type ShortlistDetail } from '../../shared/shortlists.ts'
import { type SearchDetail, type SearchSummary } from '../../shared/searches.ts'
import { type Comparison } from '../../shared/comparisons.ts'
import { explorationKey, newerExploration } from './explorations.ts'
import { withCertification } from './certificates.ts'
import { placeRescoring } from './rescorings.ts'
import { withReport } from './comparisons.ts'
import { placeAssignment } from './assignments.ts'
import { placeVerdicts } from './verdicts.ts'
import { openEventStream, type StreamState } from './eventStream.ts'
import { previewKey } from './previews.ts'
import { apiUrl } from './request.ts'
import { sessionKey } from './session.ts'

type HodgeCounts = z.infer<typeof hodgeCountsSchema>

/** What each event does to the cache of this tab. */
export function applyEvent(client: QueryClient, campaign: string, event: StreamEvent): void {
  switch (event.kind) {
    case 'search':
      return applySearch(client, campaign, event)
    case 'null':
      return applyNull(client, event)
    case 'preview':
      client.setQueryData(previewKey(event.preview.id), event.preview)
      return
    case 'exploration': {
      const { exploration } = event
      client.setQueryData<Exploration>(explorationKey(exploration.id), (known) =>
        newerExploration(known, exploration),
      )
      return
    }
    case 'certification':
      return applyCertification(client, campaign, event)
    case 'verdict':
      return applyVerdicts(client, campaign, [event])
    case 'verdicts':
      return applyVerdicts(client, campaign, event.verdicts)
    case 'assigned':
      placeAssignment(client, event)
      void client.invalidateQueries({ queryKey: ['campaign', campaign] })
      return
    case 'comment':
      void client.invalidateQueries({ queryKey: ['comments', campaign, event.candidateKey] })
      void client.invalidateQueries({ queryKey: ['mentions', campaign] })
      return
    case 'rescoring':
      return placeRescoring(client, campaign, event.rescoring)
    case 'library':
      return applyLibrary(client, event)
    case 'class-count':
      return applyClassCount(client, event)
    case 'undescribed':
      return applyDescription(client, event)
    case 'changed': {
      const keys = {
        targets: ['targets', campaign],
        searches: ['searches', campaign],
        shortlists: ['shortlists', campaign],
        members: ['campaigns'],
        imports: ['imported-candidates', campaign],
        collections: ['collections'],
        'external-tables': ['external-tables', campaign],
        'shortlist-views': ['shortlist-views', campaign],
      } as const
      void client.invalidateQueries({ queryKey: keys[event.what] })
      void client.invalidateQueries({ queryKey: ['campaign', campaign] })
      if (event.what === 'external-tables') void client.invalidateQueries({ queryKey: ['shortlist'] })
      if (event.what === 'searches') void client.invalidateQueries({ queryKey: ['comparison', campaign] })
      // Also whether they are held up, which no event of a single search tells.
      if (event.what === 'searches') void client.invalidateQueries({ queryKey: ['search'] })
      return
    }
    case 'closed':
      if (event.reason === 'signed-out') void client.invalidateQueries({ queryKey: sessionKey })
      if (event.reason === 'role-lost') void client.invalidateQueries()
  }
}

/** Where the null decides what a hit is, hits are counted anew when it is complete. */
function applyNull(client: QueryClient, event: StreamEvent & { kind: 'null' }): void {
  const { searchId, summary } = event
  const known = client.getQueryData<SearchDetail>(['search', searchId])
  if (known) client.setQueryData<SearchDetail>(['search', searchId], { ...known, null: summary })
  reportToComparisons(client, event)
  if (!summary.complete) return
  if (known?.ownHitLine === false) void client.invalidateQueries({ queryKey: ['search', searchId] })
  void client.invalidateQueries({ queryKey: ['comparison'] })
}

/** A verdict goes straight into the lists of its target: fetching thousands of rows again would be felt at each key. */
function applyVerdicts(
  client: QueryClient,
  campaign: string,
  verdicts: Parameters<typeof placeVerdicts>[1],
): void {
  placeVerdicts(client, verdicts)
  void client.invalidateQueries({ queryKey: ['campaign', campaign] })
  void client.invalidateQueries({ queryKey: ['shortlists', campaign] })
  const [only] = verdicts
  const key = verdicts.length === 1 && only ? [only.candidateKey] : []
  void client.invalidateQueries({ queryKey: ['candidate-record', campaign, ...key] })
  void client.invalidateQueries({ queryKey: ['relatives'] })
}

/** A certificate that was made goes into the shortlists of its target version; what only moved is asked for again. */
function applyCertification(
  client: QueryClient,
  campaign: string,
  { certification, made }: StreamEvent & { kind: 'certification' },
): void {
  client.setQueryData<Certification[]>(
    ['certifications', campaign],
    (old) => old && withCertification(old, certification),
  )
  if (made === null) {
    void client.invalidateQueries({ queryKey: ['shortlist'] })
    void client.invalidateQueries({ queryKey: ['certificates'] })
    void client.invalidateQueries({ queryKey: ['candidate-record', campaign] })
    return
  }
  const { candidateKey, ...mark } = made
  client.setQueriesData<ShortlistDetail>({ queryKey: ['shortlist'] }, (list) => {
    if (!list || list.targetVersionId !== certification.targetVersionId) return list
    const rows = list.rows.map((row) =>
      row.candidateKey === candidateKey ? { ...row, certificate: mark } : row,
    )
    return { ...list, rows }
  })
  void client.invalidateQueries({ queryKey: ['certificates', candidateKey] })
  void client.invalidateQueries({ queryKey: ['candidate-record', campaign, candidateKey] })
}

/** While the bundled polytopes are loaded only the progress moves; the tables are fetched again at the end. */
function applyLibrary(client: QueryClient, { loaded, total }: StreamEvent & { kind: 'library' }): void {
  if (loaded >= total) {
    void client.invalidateQueries({ queryKey: ['polytopes'] })
    return
  }
  client.setQueriesData<HodgeCounts>(
    { queryKey: ['polytopes', 'hodge'] },
    (old) => old && { ...old, loading: { loaded, total } },
  )
}

/** The tables are fetched again when the last number of the library is known. */
function applyDescription(client: QueryClient, { left }: StreamEvent & { kind: 'undescribed' }): void {
  if (left === 0) {
    void client.invalidateQueries({ queryKey: ['polytopes'] })
    return
  }
  client.setQueriesData<HodgeCounts>(
    { queryKey: ['polytopes', 'hodge'] },
    (old) => old && { ...old, undescribed: left },
  )
}

function applyClassCount(client: QueryClient, event: StreamEvent & { kind: 'class-count' }): void {
  const { key, seen, ended } = event
  client.setQueriesData<PolytopeClasses>(
    { queryKey: ['polytope-classes', key] },
    (old) => old && { ...old, counting: { seen } },
  )
  if (!ended) return
  void client.invalidateQueries({ queryKey: ['polytope-classes', key] })
  void client.invalidateQueries({ queryKey: ['polytopes'] })
}

function reportToComparisons(client: QueryClient, event: StreamEvent & { kind: 'search' | 'null' }): void {
  client.setQueriesData<Comparison>({ queryKey: ['comparison'] }, (old) => old && withReport(old, event))
}

function applySearch(client: QueryClient, campaign: string, event: StreamEvent & { kind: 'search' }): void {
  const { id, state, progress } = event
  reportToComparisons(client, event)
  const known = client.getQueryData<SearchDetail>(['search', id])
  const moved = { state, evaluations: progress.evaluations, best: progress.best }
  if (known) client.setQueryData<SearchDetail>(['search', id], { ...known, ...moved, progress })
  const inList = (list: SearchSummary[]) => list.map((row) => (row.id === id ? { ...row, ...moved } : row))
  client.setQueryData<SearchSummary[]>(['searches', campaign], (old) => old && inList(old))
  client.setQueryData<CampaignDetail>(
    ['campaign', campaign],
    (old) => old && { ...old, searchList: inList(old.searchList) },
  )
  if (!known) return
  const newBest = progress.bestKey !== null && progress.bestKey !== known.progress.bestKey
  // The list of best candidates travels only with the whole record.
  if (newBest || state !== known.state) void client.invalidateQueries({ queryKey: ['search', id] })
}

/** What never goes stale, and what would start work anew. */
const lasting = new Set([
  ...['candidate', 'candidate-spectra', 'class-picture', 'preview', 'preview-start'],
  ...['exploration-start', 'exploration-rows', 'exploration-opened'],
])

/** Keeps the tab's stream open for a campaign; returns its state. */
export function useLiveEvents(campaign: string | null, enabled: boolean): StreamState {
  const client = useQueryClient()
  const [state, setState] = useState<StreamState>('connecting')
  useEffect(() => {
    if (!enabled || campaign === null) return
    let lost = false
    return openEventStream({
      url: apiUrl('/events', { campaign }),
      onEvent: (event) => applyEvent(client, campaign, event),
      onState: (next) => {
        setState(next)
        if (next === 'waiting') lost = true
        if (next === 'live' && lost) {
          // What happened while the connection was down was not heard.
          lost = false
          void client.invalidateQueries({ predicate: (query) => !lasting.has(String(query.queryKey[0])) })
        }
      },
    })
  }, [client, campaign, enabled])
  return state
}
