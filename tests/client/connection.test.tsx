// @vitest-environment happy-dom
import { afterEach, describe, expect, it, vi } from 'vitest'
import { useQuery } from '@tanstack/react-query'
import { cleanup, screen, waitFor } from '@testing-library/react'
import { z } from 'zod'
import { noteReached } from '../../src/api/connection.ts'
import { request } from '../../src/api/request.ts'
import { ConnectionLine } from '../../src/components/shell/ConnectionLine.tsx'
import { QueryView } from '../../src/components/ui/States.tsx'
import { renderPage } from './renderPage.tsx'
import { stubApi } from './stubApi.ts'

let stop = () => {}
afterEach(() => {
  stop()
  cleanup()
  noteReached()
  vi.unstubAllGlobals()
})

function Page() {
  const query = useQuery({
    queryKey: ['thing'],
    queryFn: () => request('/thing', { schema: z.object({ n: z.number() }) }),
  })
  return (
    <>
      <input aria-label="typed" defaultValue="kept" />
      <QueryView query={query} what="the thing">
        {({ n }) => <p>thing {n}</p>}
      </QueryView>
      <ConnectionLine stream="live" />
    </>
  )
}
const answers = { 'GET /thing': { n: 7 }, 'GET /health': {} }
const line = () => screen.queryByText(/No connection to the server; retrying/)

describe('a lost connection', () => {
  it('is said while it lasts; what could not be loaded then loads by itself', async () => {
    vi.stubGlobal('fetch', () => Promise.reject(new TypeError('fetch failed')))
    stop = renderPage(<Page />, '/here', '/here').stopKeys
    expect((await screen.findByRole('alert')).textContent).toContain('appears by itself')
    await waitFor(() => expect(line()).toBeTruthy())
    stubApi(answers)
    await screen.findByText('thing 7')
    await waitFor(() => expect(line()).toBeNull())
    expect(screen.getByLabelText<HTMLInputElement>('typed').value).toBe('kept')
  })

  it('is found out at once when the browser says that it is online', async () => {
    vi.stubGlobal('fetch', () => Promise.reject(new TypeError('fetch failed')))
    stop = renderPage(<Page />, '/here', '/here').stopKeys
    await screen.findByRole('alert')
    const calls = stubApi(answers)
    window.dispatchEvent(new Event('online'))
    await screen.findByText('thing 7')
    expect(calls.map(({ path }) => path)).toEqual(['/health', '/thing'])
  })

  it('is no matter where the server answers, whatever it says', async () => {
    stubApi({})
    stop = renderPage(<Page />, '/here', '/here').stopKeys
    expect((await screen.findByRole('alert')).textContent).toContain('not-found')
    expect(line()).toBeNull()
  })
})
