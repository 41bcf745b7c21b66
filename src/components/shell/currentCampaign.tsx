import { createContext, useContext } from 'react'
import { type CampaignSummary } from '../../../shared/campaigns.ts'
import { may, type Permission } from '../../../shared/roles.ts'

/** The campaign a tab works in: named by the address, else the last one visited, else the first. */
export const CurrentCampaign = createContext<CampaignSummary | null>(null)

export function useCurrentCampaign(): CampaignSummary | null {
  return useContext(CurrentCampaign)
}

/** false when the role in a campaign allows it, otherwise the reason it does not. */
export function whyBarred(campaign: CampaignSummary | null, permission: Permission): string | false {
  if (!campaign) return 'You are not in a campaign yet.'
  if (may(campaign.role, permission)) return false
  return `Your role in this campaign, ${campaign.role}, does not include this. A lead can change it.`
}

/** The same for the campaign in hand: for `unavailable` of a button. */
export function useBarred(permission: Permission): string | false {
  return whyBarred(useContext(CurrentCampaign), permission)
}
