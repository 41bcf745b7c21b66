// @vitest-environment happy-dom
import { useState } from 'react'
import { afterEach, describe, expect, it, vi } from 'vitest'
import { cleanup, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { ActionButton } from '../../src/actions/ActionButton.tsx'
import { shortcutName } from '../../src/actions/keys.ts'
import { liveActions, registerActions, type Action, type LiveAction } from '../../src/actions/registry.ts'
import { useActions } from '../../src/actions/useActions.ts'
import { renderPage } from './renderPage.tsx'

const action = (
  id: string,
  shortcut?: string | string[],
  run = () => {},
): LiveAction & { run: () => void } => ({
  ...{ id, label: `Do ${id}`, section: 'Test', shortcut, run },
})

let stop = () => {}
afterEach(() => {
  stop()
  cleanup()
  window.localStorage.clear()
})

function show(page: React.ReactElement) {
  const view = renderPage(page, '/here', '/here')
  stop = view.stopKeys
  return view
}

function Page({ actions, children }: { actions: Action[]; children?: React.ReactNode }) {
  useActions(actions)
  return <div>{children}</div>
}

describe('the registry of actions', () => {
  it('refuses a key or a name that is taken, and takes neither after that', () => {
    const leave = registerActions([action('one', ['j', 'ArrowDown'])])
    expect(() => registerActions([action('two', 'ArrowDown')])).toThrow(
      /“one” and “two” both bind.*ArrowDown/,
    )
    expect(() => registerActions([action('one')])).toThrow(/named “one”/)
    expect(() => registerActions([action('a', 'v'), action('b', 'v')])).toThrow(/both bind the key “v”/)
    expect(liveActions().map(({ id }) => id)).toEqual(['one'])
    leave()
    registerActions([action('two', 'ArrowDown')])()
    expect(liveActions()).toEqual([])
  })

  it('holds the actions of what is on the page, and hands a key over from one page to the next', async () => {
    function Pages() {
      const [first, setFirst] = useState(true)
      const go = { id: 'go', label: 'Go on', section: 'Test', run: () => setFirst(false) }
      return (
        <Page actions={[go]}>
          {first ? (
            <Page key="a" actions={[action('a', 'x')]} />
          ) : (
            <Page key="b" actions={[action('b', 'x')]} />
          )}
          <ActionButton action={{ ...go, id: 'button', label: 'On' }} />
        </Page>
      )
    }
    const { unmount } = show(<Pages />)
    expect(
      liveActions()
        .map(({ id }) => id)
        .sort(),
    ).toEqual(['a', 'button', 'go'])
    await userEvent.click(screen.getByRole('button', { name: 'On' }))
    expect(
      liveActions()
        .map(({ id }) => id)
        .sort(),
    ).toEqual(['b', 'button', 'go'])
    unmount()
    expect(liveActions()).toEqual([])
  })
})

describe('shortcuts', () => {
  it('run what was drawn last, not what was registered first', async () => {
    const seen: number[] = []
    function Counter() {
      const [count, setCount] = useState(0)
      const run = () => {
        seen.push(count)
        setCount(count + 1)
      }
      return <Page actions={[action('count', 'c', run)]} />
    }
    show(<Counter />)
    await userEvent.keyboard('ccc')
    expect(seen).toEqual([0, 1, 2])
  })

  it('single keys rest while one types, chords do not; neither acts behind a dialog', async () => {
    const single = vi.fn()
    const chord = vi.fn()
    show(
      <Page actions={[action('single', 's', single), action('chord', 'Mod+s', chord)]}>
        <input aria-label="field" />
        <div role="dialog">
          <button>inside</button>
        </div>
      </Page>,
    )
    await userEvent.click(screen.getByLabelText('field'))
    await userEvent.keyboard('s{Control>}s{/Control}')
    expect([single.mock.calls.length, chord.mock.calls.length]).toEqual([0, 1])
    await userEvent.click(screen.getByRole('button'))
    await userEvent.keyboard('s{Control>}s{/Control}')
    expect([single.mock.calls.length, chord.mock.calls.length]).toEqual([0, 1])
  })

  it('are told apart by the person who switches single keys off', async () => {
    const [single, chord, help] = [vi.fn(), vi.fn(), vi.fn()]
    show(<Page actions={[action('s', 's', single), action('c', 'Mod+s', chord), action('h', '?', help)]} />)
    window.localStorage.setItem('tessellary.shortcuts', 'off')
    await userEvent.keyboard('s{Control>}s{/Control}?')
    expect([single, chord, help].map(({ mock }) => mock.calls.length)).toEqual([0, 1, 1])
  })

  it('an unavailable action is refused, by key and by button', async () => {
    const run = vi.fn()
    show(<ActionButton action={{ ...action('barred', 'b', run), unavailable: 'Not now.' }} />)
    await userEvent.keyboard('b')
    await userEvent.click(screen.getByRole('button', { name: 'Do barred' }))
    liveActions()[0]?.run()
    expect(run).not.toHaveBeenCalled()
    expect(screen.getByRole('button').getAttribute('title')).toBe('Not now.')
  })

  it('are written as they stand on keys', () => {
    expect(['Mod+k', 'Mod+Enter', 'ArrowUp', 'v', '?', '+'].map(shortcutName)).toEqual([
      'Ctrl K',
      'Ctrl Enter',
      '↑',
      'v',
      '?',
      '+',
    ])
  })
})
