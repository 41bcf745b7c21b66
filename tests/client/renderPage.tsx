import { type ReactElement } from 'react'
import { configure, render } from '@testing-library/react'
import { QueryClient, QueryClientProvider } from '@tanstack/react-query'
import { createMemoryRouter, RouterProvider } from 'react-router-dom'
import { type CampaignSummary } from '../../shared/campaigns.ts'
import { type Role } from '../../shared/roles.ts'
import { CurrentCampaign } from '../../src/components/shell/currentCampaign.tsx'
import { dispatchShortcut } from '../../src/actions/keys.ts'

/** Waits end with the event; the limit only has to hold on a machine that is busy with other things. */
configure({ asyncUtilTimeout: 20_000 })

export function campaignAs(role: Role): CampaignSummary {
  return {
    id: 'c1',
    name: 'Long axions',
    description: '',
    role,
    secondReader: false,
    targets: 1,
    searches: 1,
    runningSearches: 0,
    shortlists: 1,
    undecided: 2,
  }
}

/** The test environment lays nothing out; tables of any length need a height to know which rows are in view. */
let owner: object = document.createElement('div')
while (!Object.hasOwn(owner, 'clientHeight')) owner = Object.getPrototypeOf(owner) as object
Object.defineProperties(owner, {
  clientHeight: { configurable: true, get: () => 640 },
  clientWidth: { configurable: true, get: () => 1200 },
})

/** Draws a page at an address, inside what every page has around it. */
export function renderPage(page: ReactElement, path: string, address: string, role: Role = 'lead') {
  const client = new QueryClient({ defaultOptions: { queries: { retry: false } } })
  const router = createMemoryRouter(
    [
      { path, element: page },
      { path: '*', element: <p>elsewhere</p> },
    ],
    { initialEntries: [address] },
  )
  const listen = (event: KeyboardEvent) => void dispatchShortcut(event)
  window.addEventListener('keydown', listen)
  const view = render(
    <QueryClientProvider client={client}>
      <CurrentCampaign value={campaignAs(role)}>
        <RouterProvider router={router} />
      </CurrentCampaign>
    </QueryClientProvider>,
  )
  return { ...view, client, router, stopKeys: () => window.removeEventListener('keydown', listen) }
}
