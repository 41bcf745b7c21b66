// @vitest-environment happy-dom
import { useState } from 'react'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { cleanup, screen, waitFor } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { useActions } from '../../src/actions/useActions.ts'
import { ActionPalette } from '../../src/components/palette/ActionPalette.tsx'
import { listAll, listFound, type Entry } from '../../src/components/palette/ranking.ts'
import { campaignAs, renderPage } from './renderPage.tsx'
import { row, shortlist } from './shortlistFixture.ts'
import { stubApi } from './stubApi.ts'

const entry = (id: string, label: string, section = 'Search', more: Partial<Entry> = {}): Entry => ({
  ...{ id, label, section, run: () => {}, ...more },
})

describe('what the palette lists', () => {
  const all = [
    entry('pause', 'Pause'),
    entry('rename', 'Rename the target', 'Target'),
    entry('search', 'Search with it', 'Target'),
    entry('new', 'New search', 'Begin'),
    entry('edit', 'Edit the campaign', 'Campaign'),
    entry('light', 'Light theme', 'Everywhere'),
  ]
  const found = (text: string, recent: string[] = []) => listFound(all, text, recent).map(({ id }) => id)

  it('finds by parts of label and section, in any order of the words', () => {
    expect(found('renm')).toEqual(['rename'])
    expect(found('target rename')[0]).toBe('rename')
    expect(found('ns')[0]).toBe('new')
    expect(found('theme')).toEqual(['light'])
    expect(found('zzz')).toEqual([])
  })

  it('puts what was used lately before what fits as well', () => {
    const pair = [entry('a', 'Export CSV', 'Shortlist'), entry('b', 'Export JSON', 'Shortlist')]
    expect(listFound(pair, 'export', ['b']).map(({ id }) => id)).toEqual(['b', 'a'])
    expect(listFound(pair, 'export csv', ['b']).map(({ id }) => id)[0]).toBe('a')
  })

  it('shows everything once without a text, what was used lately on top, and few of many named things', () => {
    const many = Array.from({ length: 50 }, (_, i) => entry(`s${i}`, `Run ${i}`, 'Search', { named: true }))
    const groups = listAll([...all, ...many], ['light', 'gone', 's49'])
    expect(groups[0]).toMatchObject({ heading: 'Used lately', entries: [{ id: 'light' }, { id: 's49' }] })
    const shown = groups.flatMap(({ entries }) => entries.map(({ id }) => id))
    expect(new Set(shown).size).toBe(shown.length)
    expect(shown).toHaveLength(2 + 5 + 5)
  })
})

const hodge = (total: number) => ({ total, counts: [], loading: null, undescribed: 0 })
const key = '0123456789abcdef0123456789abcdef'

function open() {
  stubApi({
    'GET /campaigns': [campaignAs('lead'), { ...campaignAs('reader'), id: 'c2', name: 'Many K3 fibres' }],
    'GET /campaigns/c1/targets': [],
    'GET /campaigns/c1/searches': [],
    'GET /campaigns/c1/shortlists': [shortlist([row(1, -4.5)])],
    'GET /polytopes/hodge': hodge(12),
  })
  const focused: string[] = []
  const note = () => focused.push(document.activeElement?.id ?? '')
  const run = vi.fn(note)
  const barred = vi.fn()
  function Page() {
    const [isOpen, setOpen] = useState(false)
    useActions([
      { id: 'palette', label: 'Actions', section: 'Everywhere', shortcut: 'Mod+k', run: () => setOpen(true) },
      { id: 'pause', label: 'Pause', section: 'Search', shortcut: 'p', run },
      { id: 'extend', label: 'Extend…', section: 'Search', unavailable: 'Pause it first.', run: barred },
    ])
    return (
      <>
        <button id="before">Before</button>
        {isOpen && <ActionPalette open onOpenChange={setOpen} />}
      </>
    )
  }
  const view = renderPage(<Page />, '/here', '/here')
  return { ...view, run, barred, focused }
}

describe('the palette', () => {
  let stop = () => {}
  beforeEach(() => window.localStorage.clear())
  afterEach(() => {
    stop()
    cleanup()
    vi.unstubAllGlobals()
  })

  const begin = async () => {
    const view = open()
    stop = view.stopKeys
    await userEvent.click(screen.getByRole('button', { name: 'Before' }))
    await userEvent.keyboard('{Control>}k{/Control}')
    await screen.findByRole('dialog', { name: 'Actions' })
    return view
  }
  const options = () => screen.getAllByRole('option').map((option) => option.textContent ?? '')

  it('runs what is chosen once the focus is back where it was, and lists it first the next time', async () => {
    const { run, focused } = await begin()
    await userEvent.keyboard('pau{Enter}')
    await waitFor(() => expect(run).toHaveBeenCalledTimes(1))
    expect(focused).toEqual(['before'])
    expect(screen.queryByRole('dialog')).toBeNull()
    await userEvent.keyboard('{Control>}k{/Control}')
    await screen.findByText('Used lately')
    expect(options()[0]).toContain('Pause')
    await userEvent.keyboard('{Escape}')
    await waitFor(() => expect(document.activeElement?.id).toBe('before'))
    expect(run).toHaveBeenCalledTimes(1)
  })

  it('lists what is unavailable with its reason, and does not run it', async () => {
    const { barred } = await begin()
    await userEvent.type(screen.getByRole('combobox'), 'extend')
    expect(options()[0]).toContain('Pause it first.')
    expect(screen.getAllByRole('option')[0]?.getAttribute('aria-disabled')).toBe('true')
    await userEvent.keyboard('{Enter}')
    expect(barred).not.toHaveBeenCalled()
  })

  it('opens a campaign by its name, a candidate by its key, polytopes by Hodge numbers', async () => {
    const { router } = await begin()
    const input = screen.getByRole('combobox')
    await userEvent.type(input, 'k3')
    await screen.findByRole('option', { name: /Many K3 fibres/ })
    for (const typed of ['50 7', '(50, 7)', 'h11 = 50, h21 = 7']) {
      await userEvent.clear(input)
      await userEvent.paste(typed)
      expect(options()[0]).toContain('Polytopes with h11 = 50, h21 = 7')
      await screen.findByText('12 polytopes')
    }
    await userEvent.clear(input)
    await userEvent.paste(`see /candidates/${key}`)
    expect(options().slice(0, 2)).toEqual([
      expect.stringContaining('Candidate 0123456789'),
      expect.stringContaining('Polytope 0123456789'),
    ])
    await userEvent.keyboard('{Enter}')
    await waitFor(() => expect(router.state.location.pathname).toBe(`/candidates/${key}`))
  })

  it('opens what the campaign holds by its name', async () => {
    const { router } = await begin()
    await userEvent.paste('nothing of that name')
    expect(screen.getByText(/Nothing fits/)).toBeTruthy()
    await userEvent.clear(screen.getByRole('combobox'))
    await userEvent.paste('first')
    await screen.findByRole('option', { name: /First pass/ })
    await userEvent.keyboard('{Enter}')
    await waitFor(() => expect(router.state.location.pathname).toBe('/campaigns/c1/shortlists/l1'))
  })

  it('closes by the key that opened it', async () => {
    await begin()
    await userEvent.keyboard('{Control>}k{/Control}')
    await waitFor(() => expect(screen.queryByRole('dialog')).toBeNull())
  })
})
