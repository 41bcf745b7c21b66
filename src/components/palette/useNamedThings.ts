import { useQuery } from '@tanstack/react-query'
import { useNavigate } from 'react-router-dom'
import { campaignsQuery } from '../../api/campaigns.ts'
import { hodgeQuery } from '../../api/polytopes.ts'
import { searchesQuery } from '../../api/searches.ts'
import { shortlistsQuery } from '../../api/shortlists.ts'
import { targetsQuery } from '../../api/targets.ts'
import { counted } from '../../lib/numbers.ts'
import { type Entry } from './ranking.ts'

interface Named {
  readonly id: string
  readonly name: string
}

/** Things that have a name: the reader's campaigns, and what the campaign in hand holds. */
export function useNamedThings(campaign: string | null): Entry[] {
  const navigate = useNavigate()
  const inCampaign = { enabled: campaign !== null }
  const campaigns = useQuery(campaignsQuery())
  const targets = useQuery({ ...targetsQuery(campaign ?? ''), ...inCampaign })
  const searches = useQuery({ ...searchesQuery(campaign ?? ''), ...inCampaign })
  const shortlists = useQuery({ ...shortlistsQuery(campaign ?? ''), ...inCampaign })
  const entries = (
    section: string,
    path: string,
    list: readonly Named[] = [],
    note?: (id: string) => string,
  ) =>
    list.map(({ id, name }): Entry => ({
      ...{ id: `${path}/${id}`, label: name, section, note: note?.(id), named: true },
      run: () => void navigate(`${path}/${id}`),
    }))
  const base = `/campaigns/${campaign ?? ''}`
  return [
    ...entries('Shortlist', `${base}/shortlists`, shortlists.data, (id) => {
      const found = shortlists.data?.find((one) => one.id === id)
      return found ? `${found.undecided} undecided` : ''
    }),
    ...entries(
      ...(['Search', `${base}/searches`, searches.data] as const),
      (id) => searches.data?.find((one) => one.id === id)?.state ?? '',
    ),
    ...entries('Target', `${base}/targets`, targets.data),
    ...entries(
      'Campaign',
      '/campaigns',
      campaigns.data?.filter(({ id }) => id !== campaign),
    ),
  ]
}

const keyPattern = /\b[0-9a-f]{32}\b/i
/** Two numbers and nothing else but commas and brackets; 'h11 = 50, h21 = 7' with its names taken out is such a text. */
const hodgePattern = /^[\s(=]*(\d{1,3})[\s,;=]+(\d{1,3})[\s)]*$/
const hodgeNames = /h\^?\{?[12],?[12]\}?/gi

/** What the text itself names: a permanent key, or a pair of Hodge numbers. */
export function useTypedThing(campaign: string | null, text: string): Entry[] {
  const navigate = useNavigate()
  const key = keyPattern.exec(text)?.[0].toLowerCase()
  const pair = key ? null : hodgePattern.exec(text.replace(hodgeNames, ' '))
  const h11 = Number(pair?.[1])
  const h21 = Number(pair?.[2])
  const range = { h11Min: h11, h11Max: h11, h21Min: h21, h21Max: h21 }
  const counts = useQuery({
    ...hodgeQuery({ ...range, campaign: campaign ?? undefined }),
    enabled: pair !== null,
  })
  const where = campaign ? `campaign=${campaign}` : ''
  const go = (to: string) => () => void navigate(to)
  if (key) {
    const found = { section: 'Key', exact: true }
    return [
      {
        ...found,
        id: 'key.candidate',
        label: `Candidate ${key.slice(0, 10)}…`,
        run: go(`/candidates/${key}?${where}`),
      },
      {
        ...found,
        id: 'key.polytope',
        label: `Polytope ${key.slice(0, 10)}…`,
        run: go(`/library/${key}?${where}`),
      },
    ]
  }
  if (!pair) return []
  const { total, loading } = counts.data ?? {}
  const unfinished = loading !== undefined && loading !== null && loading.loaded < loading.total
  const query = new URLSearchParams(Object.entries(range).map(([name, value]) => [name, String(value)]))
  if (campaign) query.set('campaign', campaign)
  return [
    {
      ...{
        id: 'library.hodge',
        section: 'Library',
        exact: true,
        label: `Polytopes with h11 = ${h11}, h21 = ${h21}`,
      },
      note: total === undefined ? 'looking' : total > 0 ? counted(total, 'polytope') : undefined,
      unavailable:
        total === 0 &&
        (unfinished ? 'None so far; the library is still being loaded.' : 'None is in the library.'),
      run: go(`/library?${query}`),
    },
  ]
}
