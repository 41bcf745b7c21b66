import { lazy, Suspense, useEffect, useMemo, useRef, useState } from 'react'
import { Link, NavLink, Navigate, Outlet, useLocation, useParams, useSearchParams } from 'react-router-dom'
import { CircleHelp } from 'lucide-react'
import { type CampaignSummary } from '../../../shared/campaigns.ts'
import { useCampaigns } from '../../api/campaigns.ts'
import { useLiveEvents } from '../../api/liveEvents.ts'
import { useSession } from '../../api/session.ts'
import { dispatchShortcut } from '../../actions/keys.ts'
import { recall, remember } from '../../lib/remembered.ts'
import { useAtRest } from '../../lib/useAtRest.ts'
import { IconButton } from '../ui/Button.tsx'
import { prepareDialogs } from '../ui/Dialog.tsx'
import { Failure, Loading } from '../ui/States.tsx'
import { AccountMenu } from './AccountMenu.tsx'
import { ConnectionLine } from './ConnectionLine.tsx'
import { CurrentCampaign } from './currentCampaign.tsx'
import { Mark } from './Mark.tsx'
import { ActionPalette, PaletteButton, preparePalette } from './PaletteButton.tsx'
import { sayFault } from './sayFault.ts'
import { ShortcutDialog } from './ShortcutDialog.tsx'
import { ThemeButton } from './ThemeButton.tsx'
import { useFocusOnNewPage } from './useFocusOnNewPage.ts'
import { useShellActions } from './useShellActions.ts'

const Notices = lazy(async () => ({ default: (await import('./Notices.tsx')).Notices }))

/** Frame of every page behind sign-in: session, campaign in hand, event stream, head line. */
export function Shell() {
  const session = useSession()
  const location = useLocation()
  if (session.isPending)
    return (
      <Centred>
        <Loading what="your session" />
      </Centred>
    )
  if (session.isError) {
    return (
      <Centred>
        <Failure error={session.error} retry={() => void session.refetch()} />
      </Centred>
    )
  }
  if (!session.data.account) {
    const to = location.pathname + location.search
    return <Navigate to={`/sign-in${to === '/' ? '' : `?then=${encodeURIComponent(to)}`}`} replace />
  }
  return <SignedIn account={session.data.account} version={session.data.version} />
}

function Centred({ children }: { children: React.ReactNode }) {
  return <main className="mx-auto max-w-[420px] px-4 pt-[20vh]">{children}</main>
}

function useCampaignInHand(): { campaign: CampaignSummary | null; settled: boolean } {
  const campaigns = useCampaigns()
  const params = useParams()
  const [search] = useSearchParams()
  const named = params.campaignId ?? search.get('campaign')
  const campaign = useMemo(() => {
    const list = campaigns.data ?? []
    if (named) return list.find(({ id }) => id === named) ?? null
    return list.find(({ id }) => id === recall('campaign')) ?? list[0] ?? null
  }, [campaigns.data, named])
  useEffect(() => {
    if (campaign) remember('campaign', campaign.id)
  }, [campaign])
  return { campaign, settled: !campaigns.isPending }
}

function SignedIn({
  account,
  version,
}: {
  account: Parameters<typeof AccountMenu>[0]['account']
  version: string
}) {
  const { campaign, settled } = useCampaignInHand()
  const stream = useLiveEvents(campaign?.id ?? null, true)
  const [helpOpen, setHelpOpen] = useState(false)
  const [paletteOpen, setPaletteOpen] = useState(false)
  useShellActions({
    account: account.id,
    campaign,
    onHelp: () => setHelpOpen(true),
    onPalette: () => setPaletteOpen(true),
  })
  useEffect(() => {
    const listen = (event: KeyboardEvent) =>
      void dispatchShortcut(event, ({ unavailable }) => sayFault(unavailable || ''))
    window.addEventListener('keydown', listen)
    return () => window.removeEventListener('keydown', listen)
  }, [])
  const atRest = useAtRest()
  useEffect(() => {
    if (atRest) void Promise.all([preparePalette(), prepareDialogs()])
  }, [atRest])
  useFocusOnNewPage()

  return (
    <CurrentCampaign value={campaign}>
      <a
        href="#content"
        className="sr-only focus:not-sr-only focus:absolute focus:z-50 focus:bg-sheet focus:p-2"
      >
        Skip to content
      </a>
      <header className="sticky top-0 z-30 bg-paper print:hidden">
        <div className="mx-auto flex max-w-[1440px] flex-wrap items-center gap-x-2 px-4 pt-1.5 sm:flex-nowrap sm:gap-x-4 sm:pb-1.5">
          <Link to="/campaigns" className="flex items-center gap-2 font-serif text-base font-semibold">
            <Mark />
            <span className="hidden sm:inline">Tessellary</span>
            <span className="sr-only sm:hidden">Tessellary</span>
          </Link>
          <MainNavigation campaign={campaign} />
          <div className="ml-auto flex items-center">
            <PaletteButton onOpen={() => setPaletteOpen(true)} />
            <ThemeButton />
            <IconButton label="Shortcuts" onClick={() => setHelpOpen(true)}>
              <CircleHelp size={16} aria-hidden />
            </IconButton>
            <AccountMenu account={account} version={version} />
          </div>
        </div>
        <div className="graduated" aria-hidden />
      </header>
      <main id="content" tabIndex={-1} className="mx-auto max-w-[1440px] px-4 pb-16 outline-none print:p-0">
        {settled ? (
          <Suspense fallback={<Loading what="the page" shape="page" />}>
            <Outlet />
          </Suspense>
        ) : (
          <Loading what="your campaigns" shape="page" />
        )}
      </main>
      <Suspense fallback={null}>
        {paletteOpen && <ActionPalette open onOpenChange={setPaletteOpen} />}
      </Suspense>
      <ConnectionLine stream={campaign === null ? null : stream} />
      <ShortcutDialog open={helpOpen} onOpenChange={setHelpOpen} />
      <Suspense fallback={null}>{atRest && <Notices />}</Suspense>
    </CurrentCampaign>
  )
}

function MainNavigation({ campaign }: { campaign: CampaignSummary | null }) {
  const base = campaign ? `/campaigns/${campaign.id}` : null
  const items: [string, string, boolean][] = [
    ...(base && campaign
      ? ([
          [base, campaign.name, true],
          [`${base}/explore`, 'Explore', false],
          [`${base}/targets`, 'Targets', false],
          [`${base}/searches`, 'Searches', false],
          [`${base}/shortlists`, 'Shortlists', false],
        ] as [string, string, boolean][])
      : []),
    [base && campaign ? `/library?campaign=${campaign.id}` : '/library', 'Library', false],
  ]
  const nav = useRef<HTMLElement>(null)
  const { pathname } = useLocation()
  // On narrow screens the line scrolls: the page one is on is brought into it.
  useEffect(() => {
    const line = nav.current
    const here = line?.querySelector<HTMLElement>('[aria-current="page"]')
    if (line && here)
      line.scrollLeft = here.offsetLeft - line.offsetLeft - (line.clientWidth - here.offsetWidth) / 2
  }, [pathname, campaign])
  return (
    <nav
      ref={nav}
      aria-label="Main"
      className="order-last flex w-full min-w-0 gap-4 overflow-x-auto sm:order-none sm:w-auto sm:flex-1"
    >
      {items.map(([to, label, end]) => (
        <NavLink
          key={to}
          to={to}
          end={end}
          className={({ isActive }) =>
            `inline-flex min-h-8 max-w-60 shrink-0 items-center border-b-2 ${isActive ? 'border-action font-medium text-ink' : 'border-transparent text-soft hover:text-ink'}`
          }
        >
          <span className="truncate">{label}</span>
        </NavLink>
      ))}
    </nav>
  )
}
