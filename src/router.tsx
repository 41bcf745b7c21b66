import { createBrowserRouter, Navigate, type RouteObject } from 'react-router-dom'
import { type ComponentType } from 'react'
import { PageFailure } from './routes/not-found/PageFailure.tsx'
import { NotFoundPage } from './routes/not-found/NotFoundPage.tsx'

/** A page loaded when it is first visited. */
const page = (load: () => Promise<ComponentType>) => async () => ({ Component: await load() })

const signedIn: RouteObject[] = [
  { index: true, element: <Navigate to="/campaigns" replace /> },
  {
    path: 'campaigns',
    lazy: page(async () => (await import('./routes/campaigns/CampaignsPage.tsx')).CampaignsPage),
  },
  {
    path: 'campaigns/:campaignId',
    lazy: page(async () => (await import('./routes/campaign/CampaignPage.tsx')).CampaignPage),
  },
  {
    path: 'campaigns/:campaignId/explore',
    lazy: page(async () => (await import('./routes/explore/ExplorePage.tsx')).ExplorePage),
  },
  {
    path: 'campaigns/:campaignId/targets',
    lazy: page(async () => (await import('./routes/targets/TargetsPage.tsx')).TargetsPage),
  },
  {
    path: 'campaigns/:campaignId/targets/new',
    lazy: page(async () => (await import('./routes/target/NewTargetPage.tsx')).NewTargetPage),
  },
  {
    path: 'campaigns/:campaignId/targets/:targetId',
    lazy: page(async () => (await import('./routes/target/TargetPage.tsx')).TargetPage),
  },
  {
    path: 'campaigns/:campaignId/searches',
    lazy: page(async () => (await import('./routes/searches/SearchesPage.tsx')).SearchesPage),
  },
  {
    path: 'campaigns/:campaignId/searches/new',
    lazy: page(async () => (await import('./routes/searches/new/NewSearchPage.tsx')).NewSearchPage),
  },
  {
    path: 'campaigns/:campaignId/searches/compare',
    lazy: page(async () => (await import('./routes/searches/compare/ComparePage.tsx')).ComparePage),
  },
  {
    path: 'campaigns/:campaignId/searches/:searchId',
    lazy: page(async () => (await import('./routes/search/SearchPage.tsx')).SearchPage),
  },
  {
    path: 'campaigns/:campaignId/shortlists',
    lazy: page(async () => (await import('./routes/shortlists/ShortlistsPage.tsx')).ShortlistsPage),
  },
  {
    path: 'campaigns/:campaignId/shortlists/new',
    lazy: page(async () => (await import('./routes/shortlists/new/NewShortlistPage.tsx')).NewShortlistPage),
  },
  {
    path: 'campaigns/:campaignId/shortlists/:shortlistId',
    lazy: page(async () => (await import('./routes/shortlist/ShortlistPage.tsx')).ShortlistPage),
  },
  {
    path: 'campaigns/:campaignId/imported',
    lazy: page(async () => (await import('./routes/imported/ImportedPage.tsx')).ImportedPage),
  },
  {
    path: 'library',
    lazy: page(async () => (await import('./routes/library/LibraryPage.tsx')).LibraryPage),
  },
  {
    path: 'library/:polytopeKey',
    lazy: page(async () => (await import('./routes/polytope/PolytopePage.tsx')).PolytopePage),
  },
  {
    path: 'candidates/compare',
    lazy: page(
      async () =>
        (await import('./routes/candidates/compare/CompareCandidatesPage.tsx')).CompareCandidatesPage,
    ),
  },
  {
    path: 'candidates/:candidateKey',
    lazy: page(async () => (await import('./routes/candidate/CandidatePage.tsx')).CandidatePage),
  },
  {
    path: 'reference',
    lazy: page(async () => (await import('./routes/reference/ReferencePage.tsx')).ReferencePage),
  },
  { path: '*', Component: NotFoundPage },
]

export const routes: RouteObject[] = [
  {
    errorElement: <PageFailure />,
    HydrateFallback: () => null,
    children: [
      {
        path: 'sign-in',
        lazy: page(async () => (await import('./routes/sign-in/SignInPage.tsx')).SignInPage),
      },
      { path: 'set-up', lazy: page(async () => (await import('./routes/set-up/SetUpPage.tsx')).SetUpPage) },
      {
        lazy: page(async () => (await import('./components/shell/Shell.tsx')).Shell),
        children: [{ errorElement: <PageFailure />, children: signedIn }],
      },
    ],
  },
]

export const createRouter = () => createBrowserRouter(routes)
