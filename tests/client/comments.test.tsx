// @vitest-environment happy-dom
import { cleanup, screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { afterEach, describe, expect, it } from 'vitest'
import { type CommentView } from '../../shared/comments.ts'
import { fittingMembers, mentionAt, partsOf } from '../../src/components/comment/mentioning.ts'
import { CommentSection } from '../../src/routes/candidate/CommentSection.tsx'
import { campaignAs, renderPage } from './renderPage.tsx'
import { stubApi } from './stubApi.ts'

afterEach(cleanup)

const members = [
  { accountId: 'a1', name: 'Ada Lind', email: 'ada@tests.example', role: 'lead' as const },
  { accountId: 'a2', name: 'Noor Adel', email: 'noor@tests.example', role: 'reader' as const },
]
const key = 'a'.repeat(32)
const comment = (id: number, more: Partial<CommentView> = {}): CommentView => ({
  id,
  authorId: 'a1',
  author: 'Ada Lind',
  text: `comment ${id}`,
  mentions: [],
  createdAt: '2026-01-02T03:04:05.000Z',
  editedAt: null,
  removed: null,
  ...more,
})

function section(list: CommentView[], role: 'lead' | 'reader' = 'lead') {
  const path = `/campaigns/c1/candidates/${key}/comments`
  const contents = { members, targetList: [], searchList: [], shortlistList: [] }
  const calls = stubApi({
    [`GET ${path}`]: () => list,
    [`POST ${path}`]: comment(9),
    'GET /campaigns/c1': { ...campaignAs(role), ...contents },
    'GET /campaigns/c1/mentions': [
      { commentId: 1, candidateKey: key, author: 'Ada Lind', text: 'x', createdAt: '' },
      { commentId: 7, candidateKey: 'b'.repeat(32), author: 'Ada Lind', text: 'x', createdAt: '' },
    ],
    'POST /campaigns/c1/mentions/1/seen': undefined,
    'GET /session': { account: { ...members[0], id: 'a1', demo: false }, version: '1' },
  })
  renderPage(
    <CommentSection campaign="c1" candidate={key} />,
    '/candidates/x',
    '/candidates/x#comments',
    role,
  )
  return calls
}

describe('mentions', () => {
  it('are completed after an @ that begins a word, by any part of a name', () => {
    expect(mentionAt('see @No', 7)).toEqual({ from: 4, typed: 'No' })
    expect(mentionAt('ada@tests', 9)).toBeNull()
    expect(mentionAt('see @No\nmore', 12)).toBeNull()
    expect(fittingMembers(members, 'ad').map(({ accountId }) => accountId)).toEqual(['a1', 'a2'])
    expect(fittingMembers(members, 'lin').map(({ accountId }) => accountId)).toEqual(['a1'])
    expect(partsOf('hi @Ada Lind!', ['Ada Lind'])).toEqual([
      { text: 'hi ', named: false },
      { text: '@Ada Lind', named: true },
      { text: '!', named: false },
    ])
  })

  it('are written by keyboard and sent with the members they name', async () => {
    const calls = section([])
    const box = await screen.findByRole('textbox', { name: 'New comment' })
    await userEvent.type(box, 'Look, @ad')
    const options = within(await screen.findByRole('listbox', { name: 'Members' })).getAllByRole('option')
    expect(options.map(({ textContent }) => textContent)).toEqual(['Ada Lind', 'Noor Adel'])
    await userEvent.type(box, '{ArrowDown}{Enter}at D3')
    expect((box as HTMLTextAreaElement).value).toBe('Look, @Noor Adel at D3')
    await userEvent.click(screen.getByRole('button', { name: 'Comment' }))
    await waitFor(() => expect(calls.find(({ method }) => method === 'POST')).toBeTruthy())
    expect(calls.filter(({ method, path }) => method === 'POST' && path.endsWith('comments'))).toMatchObject([
      { body: { text: 'Look, @Noor Adel at D3', mentions: ['a2'] } },
    ])
    await waitFor(() => expect((box as HTMLTextAreaElement).value).toBe(''))
  })
})

describe('comments', () => {
  it('are text and never HTML; edits are marked, removed ones leave a line', async () => {
    const calls = section([
      comment(1, { text: '<img src=x onerror=alert(1)> & more', editedAt: '2026-01-03T00:00:00.000Z' }),
      comment(2, { text: '', removed: { at: '2026-01-03T00:00:00.000Z', by: 'Noor Adel' } }),
    ])
    const list = await screen.findByRole('list', { name: /Comments/ })
    expect(within(list).getByText('<img src=x onerror=alert(1)> & more')).toBeTruthy()
    expect(list.querySelector('img')).toBeNull()
    expect(within(list).getByText('edited')).toBeTruthy()
    expect(list.textContent).toContain('A comment of Ada Lind was removed by Noor Adel')
    // The one that names the reader here has been seen; the other is on another page.
    await waitFor(() =>
      expect(calls.filter(({ path }) => path.endsWith('/seen')).map(({ path }) => path)).toEqual([
        '/campaigns/c1/mentions/1/seen',
      ]),
    )
  })

  it('are read but not written by a reader, who is told why', async () => {
    section([comment(1, { authorId: 'a2' })], 'reader')
    await screen.findByText('comment 1')
    const box = screen.getByRole('textbox', { name: 'New comment' })
    expect(box.getAttribute('title')).toContain('reader')
    expect(screen.queryByRole('button', { name: 'Remove' })).toBeNull()
  })
})
