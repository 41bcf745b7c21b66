// @vitest-environment happy-dom
import { afterEach, describe, expect, it, vi } from 'vitest'
import { cleanup, screen, waitFor } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { safeDestination, SignInPage } from '../../src/routes/sign-in/SignInPage.tsx'
import { renderPage } from './renderPage.tsx'
import { problem, Status, stubApi } from './stubApi.ts'

afterEach(() => {
  cleanup()
  vi.unstubAllGlobals()
})
const nobody = { account: null, version: '0' }
const somebody = { account: { id: 'a1', name: 'Ada Quill', email: 'ada@example.org' }, version: '0' }

async function signIn(email = 'ada@example.org') {
  await userEvent.type(await screen.findByLabelText('E-mail address'), email)
  await userEvent.type(screen.getByLabelText('Password'), 'correct horse')
  await userEvent.click(screen.getByRole('button', { name: 'Sign in' }))
}

describe('sign-in', () => {
  it('goes where the person wanted to go', async () => {
    const calls = stubApi({ 'GET /session': nobody, 'POST /session': somebody })
    const { router, stopKeys } = renderPage(
      <SignInPage />,
      '/sign-in',
      '/sign-in?then=%2Flibrary%3Fh11Min%3D3',
    )
    await signIn()
    await waitFor(() => expect(router.state.location.pathname).toBe('/library'))
    expect(router.state.location.search).toBe('?h11Min=3')
    expect(calls.find(({ method }) => method === 'POST')?.body).toEqual({
      email: 'ada@example.org',
      password: 'correct horse',
    })
    stopKeys()
  })

  it('says what the server says when it refuses', async () => {
    stubApi({
      'GET /session': nobody,
      'POST /session': new Status(
        401,
        problem(401, 'wrong-credentials', 'E-mail address or password is wrong.'),
      ),
    })
    const { stopKeys } = renderPage(<SignInPage />, '/sign-in', '/sign-in')
    await signIn()
    expect((await screen.findByRole('alert')).textContent).toBe('E-mail address or password is wrong.')
    stopKeys()
  })

  it('does not send what is no e-mail address', async () => {
    const calls = stubApi({ 'GET /session': nobody })
    const { stopKeys } = renderPage(<SignInPage />, '/sign-in', '/sign-in')
    await signIn('ada')
    expect(await screen.findByRole('alert')).toBeTruthy()
    expect(calls.some(({ method }) => method === 'POST')).toBe(false)
    stopKeys()
  })

  it('never leads out of the application', () => {
    expect(safeDestination('/library?x=1')).toBe('/library?x=1')
    for (const bad of [
      null,
      '',
      'https://elsewhere.example',
      '//elsewhere.example',
      '/\\elsewhere.example',
    ]) {
      expect(safeDestination(bad)).toBe('/campaigns')
    }
  })
})
