// @vitest-environment happy-dom
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { act, cleanup, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { type CampaignDetail } from '../../shared/campaigns.ts'
import { FirstSteps } from '../../src/routes/campaign/FirstSteps.tsx'
import { remember } from '../../src/lib/remembered.ts'
import { campaignAs, renderPage } from './renderPage.tsx'
import { row, shortlist } from './shortlistFixture.ts'
import { stubApi } from './stubApi.ts'

const empty: CampaignDetail = {
  ...campaignAs('lead'),
  members: [],
  targetList: [],
  searchList: [],
  shortlistList: [],
}
const some = (found: number | null) =>
  ({
    targetList: [{ id: 't1' }],
    searchList: [{ id: 's1', best: found }],
  }) as unknown as Partial<CampaignDetail>
let stop = () => {}

async function show(campaign: Partial<CampaignDetail>) {
  stubApi({ 'GET /session': { account: { id: 'a1', name: 'Ada', email: 'a@b.example' }, version: '' } })
  const view = renderPage(<FirstSteps campaign={{ ...empty, ...campaign }} />, '/here', '/here')
  stop = view.stopKeys
  await act(() => vi.waitFor(() => expect(view.client.isFetching()).toBe(0)))
  return view
}
const done = () => screen.queryAllByRole('link').filter(({ textContent }) => /done/.test(textContent ?? ''))
const next = () => document.querySelector('[aria-current=step]')?.textContent

describe('the first steps', () => {
  beforeEach(() => window.localStorage.clear())
  afterEach(() => {
    stop()
    cleanup()
    vi.unstubAllGlobals()
  })

  it('are ticked by what the campaign holds', async () => {
    await show({})
    expect([done().length, next()]).toEqual([0, 'Write a target'])
    cleanup()
    await show(some(-5))
    expect([done().length, next()]).toEqual([2, 'Make a shortlist'])
    expect(screen.getByRole('link', { name: 'Make a shortlist' }).getAttribute('href')).toBe(
      '/campaigns/c1/shortlists/new?search=s1',
    )
    cleanup()
    await show({ ...some(-5), shortlistList: [shortlist([row(1, -4.5)])] })
    expect([done().length, next()]).toEqual([3, 'Give a first verdict'])
    expect(screen.getByRole('link', { name: 'Give a first verdict' }).getAttribute('href')).toBe(
      '/campaigns/c1/shortlists/l1',
    )
  })

  it('go away when they are done or put away, and come back when they are asked for', async () => {
    await show({ ...some(-5), shortlistList: [{ ...shortlist([row(1, -4.5)]), rejected: 1 }] })
    expect(screen.queryByText('A first shortlist')).toBeNull()
    act(() => remember('first-steps.a1', 'shown'))
    expect([done().length, next()]).toEqual([4, undefined])
    await userEvent.click(screen.getByRole('button', { name: 'Put away' }))
    expect(screen.queryByText('A first shortlist')).toBeNull()
    cleanup()
    await show({})
    expect(screen.queryByText('A first shortlist')).toBeNull()
  })

  it('are not for those who only read', async () => {
    await show({ role: 'reader' })
    expect(screen.queryByText('A first shortlist')).toBeNull()
  })
})
