import type { CampaignDetail, CampaignSummary } from '../../shared/campaigns.ts'
import type { Role } from '../../shared/roles.ts'
import type { Campaign } from '../entities/campaign.ts'
import type { Membership } from '../entities/membership.ts'
import type { Search } from '../entities/search.ts'
import type { Shortlist } from '../entities/shortlist.ts'
import type { TargetWithVersions } from '../services/targets.ts'
import { presentSearchSummary } from './searches.ts'
import { presentShortlistSummary, type Tally } from './shortlists.ts'
import { presentTargetSummary } from './targets.ts'

export interface CampaignCounts {
  readonly targets: number
  readonly searches: number
  readonly runningSearches: number
  readonly shortlists: number
  readonly undecided: number
}

export function presentCampaignSummary(
  campaign: Campaign,
  role: Role,
  counts: CampaignCounts,
): CampaignSummary {
  const { id, name, description, secondReader } = campaign
  return { id, name, description, secondReader, role, ...counts }
}

export interface CampaignContents {
  readonly counts: CampaignCounts
  /** With account loaded. */
  readonly members: readonly Membership[]
  readonly targets: readonly TargetWithVersions[]
  readonly searches: readonly Search[]
  readonly shortlists: readonly Shortlist[]
  readonly tallies: ReadonlyMap<string, Tally>
}

export function presentCampaign(campaign: Campaign, role: Role, contents: CampaignContents): CampaignDetail {
  return {
    ...presentCampaignSummary(campaign, role, contents.counts),
    members: contents.members.map((member) => ({
      accountId: member.accountId,
      name: member.account?.name ?? '',
      email: member.account?.email ?? '',
      role: member.role,
    })),
    targetList: contents.targets.map(({ target, versions }) => presentTargetSummary(target, versions)),
    searchList: contents.searches.map(presentSearchSummary),
    shortlistList: contents.shortlists.map((shortlist) =>
      presentShortlistSummary(shortlist, contents.tallies.get(shortlist.id) ?? emptyTally),
    ),
  }
}

export const emptyTally: Tally = { size: 0, verified: 0, rejected: 0, oneReader: 0, waiting: [] }
