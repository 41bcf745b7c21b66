import { type Permission } from '../../shared/roles.ts'
import { type CampaignSummary } from '../../shared/campaigns.ts'
import { useCurrentCampaign, whyBarred } from '../components/shell/currentCampaign.tsx'
import { type Action } from './registry.ts'

const begin = 'Begin'
const goTo = 'Go to'

/** What every page of a campaign offers: its pages, and what begins something new. */
export function campaignActions(campaign: CampaignSummary | null) {
  const base = campaign ? `/campaigns/${campaign.id}` : '/campaigns'
  const standing = true as const
  const unavailable = campaign ? false : 'You are not in a campaign yet.'
  const page = (id: string, label: string, to: string): Action => ({
    ...{ id: `go.${id}`, label, section: goTo, to: base + to, unavailable, standing },
  })
  const fresh = (noun: string, permission: Permission): Action => ({
    ...{ id: `${noun}.new`, label: `New ${noun}`, section: begin, standing },
    ...{
      to: `${base}/${noun === 'search' ? 'searches' : `${noun}s`}/new`,
      unavailable: whyBarred(campaign, permission),
    },
  })
  return {
    newTarget: fresh('target', 'targets.edit'),
    newSearch: fresh('search', 'searches.run'),
    newShortlist: fresh('shortlist', 'shortlists.edit'),
    campaign: page('campaign', campaign ? `Campaign “${campaign.name}”` : 'Campaign', ''),
    explore: page('explore', 'Explore', '/explore'),
    targets: page('targets', 'Targets', '/targets'),
    searches: page('searches', 'Searches', '/searches'),
    shortlists: page('shortlists', 'Shortlists', '/shortlists'),
    imported: page('imported', 'Imported candidates', '/imported'),
    library: {
      ...{ id: 'go.library', label: 'Library of polytopes', section: goTo, standing },
      to: campaign ? `/library?campaign=${campaign.id}` : '/library',
    },
    reference: { id: 'go.reference', label: 'Observables', section: goTo, standing, to: '/reference' },
    campaigns: { id: 'go.campaigns', label: 'All campaigns', section: goTo, standing, to: '/campaigns' },
  } satisfies Record<string, Action>
}

export const useCampaignActions = () => campaignActions(useCurrentCampaign())
