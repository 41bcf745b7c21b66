import { type CampaignDetail } from '../../../shared/campaigns.ts'
import { assemblyPath } from '../shortlists/new/assemblyAddress.ts'

export interface Step {
  readonly label: string
  readonly says: string
  readonly to: string
  readonly done: boolean
}

/** The way to a first shortlist of a campaign, with what of it has been gone. */
export function firstSteps(campaign: CampaignDetail): Step[] {
  const base = `/campaigns/${campaign.id}`
  const { targetList, searchList, shortlistList } = campaign
  const found = searchList.find(({ best }) => best !== null)
  const open = shortlistList.find(({ undecided }) => undecided > 0) ?? shortlistList[0]
  return [
    {
      label: 'Write a target',
      says: 'A few lines that say what a good candidate is. A starter can be changed to what you look for.',
      to: `${base}/targets/new`,
      done: targetList.length > 0,
    },
    {
      label: 'Start a search',
      says: 'Choose polytopes and a budget; what it will cost stands beside the button.',
      to: `${base}/searches/new`,
      done: searchList.length > 0,
    },
    {
      label: 'Make a shortlist',
      says: 'Of what the search has found so far; it need not have ended.',
      to: found ? assemblyPath(campaign.id, [found.id]) : `${base}/shortlists/new`,
      done: shortlistList.length > 0,
    },
    {
      label: 'Give a first verdict',
      says: 'On the list one key decides and goes on: v, r or u. ? shows them all.',
      to: open ? `${base}/shortlists/${open.id}` : `${base}/shortlists`,
      done: shortlistList.some(({ verified, rejected }) => verified + rejected > 0),
    },
  ]
}
