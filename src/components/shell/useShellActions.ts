import { useNavigate } from 'react-router-dom'
import { type CampaignSummary } from '../../../shared/campaigns.ts'
import { useShortcutsOn } from '../../actions/keys.ts'
import { type Action } from '../../actions/registry.ts'
import { useActions } from '../../actions/useActions.ts'
import { campaignActions } from '../../actions/useCampaignActions.ts'
import { useFirstStepsShown } from '../../lib/firstStepsShown.ts'
import { useTheme, type Theme } from '../../lib/theme.ts'
import { whyBarred } from './currentCampaign.tsx'
import { useSignOutAction } from './useSignOutAction.ts'

const themes: readonly [Theme, string][] = [
  ['light', 'Light theme'],
  ['dark', 'Dark theme'],
  ['system', 'Theme as the system has it'],
]

interface ShellActions {
  account: string
  campaign: CampaignSummary | null
  onHelp: () => void
  onPalette: () => void
}

/** What can be done on every page. */
export function useShellActions({ account, campaign, onHelp, onPalette }: ShellActions): void {
  const [theme, setTheme] = useTheme()
  const [shortcutsOn, setShortcutsOn] = useShortcutsOn()
  const [, showFirstSteps] = useFirstStepsShown(account)
  const navigate = useNavigate()
  const signOut = useSignOutAction()
  const everywhere: Action[] = [
    {
      id: 'palette',
      label: 'Find an action or a thing',
      section: 'Everywhere',
      shortcut: 'Mod+k',
      run: onPalette,
    },
    { id: 'shortcuts', label: 'Shortcuts of this page', section: 'Everywhere', shortcut: '?', run: onHelp },
    {
      ...{ id: 'first-steps', label: 'Show the first steps', section: 'Everywhere' },
      unavailable: whyBarred(campaign, 'targets.edit'),
      run: () => {
        showFirstSteps(true)
        void navigate(`/campaigns/${campaign?.id ?? ''}`)
      },
    },
    {
      ...{ id: 'shortcuts.switch', section: 'Everywhere', run: () => setShortcutsOn(!shortcutsOn) },
      label: `Switch single-key shortcuts ${shortcutsOn ? 'off' : 'on'}`,
    },
    ...themes.map(([value, label]): Action => ({
      ...{ id: `theme.${value}`, label, section: 'Everywhere', run: () => setTheme(value) },
      unavailable: theme === value && 'It is so now.',
    })),
    { id: 'sign-out', label: 'Sign out', section: 'Account', run: signOut },
  ]
  useActions([...Object.values(campaignActions(campaign)), ...everywhere])
}
