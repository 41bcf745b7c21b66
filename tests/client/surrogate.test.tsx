// @vitest-environment happy-dom
import { render, screen } from '@testing-library/react'
import { userEvent } from '@testing-library/user-event'
import { describe, expect, it } from 'vitest'
import { SurrogateFacts } from '../../src/routes/search/SurrogateFacts.tsx'
import { MethodFields } from '../../src/routes/searches/new/MethodFields.tsx'
import type { Draft } from '../../src/routes/searches/new/searchPreset.ts'
import { SurrogateBox } from '../../src/routes/searches/new/SurrogateBox.tsx'
import type { SearchDetail, SurrogateReport } from '../../shared/searches.ts'

const report = { skill: 0.6234, predictions: 200, aside: false, offered: 4080, chosen: 340 }

function says(surrogate: SurrogateReport | null | undefined, asked = true): string {
  const progress = { evaluations: 400, surrogate } as SearchDetail['progress']
  const { container, unmount } = render(<SurrogateFacts search={{ surrogate: asked, progress }} />)
  const text = (container.textContent ?? '').replaceAll('\u2009', '').trim()
  unmount()
  return text
}

describe('the surrogate on the page of a search', () => {
  it('states its skill and what it chose', () => {
    expect(says(report)).toBe(
      'Skill 0.62, the rank correlation of the last 200 predictions with what the rule then said. Chose 340 of 4080 proposals.',
    )
  })

  it('says when it steps aside, and when it has no say at all', () => {
    expect(says({ ...report, skill: 0.1, aside: true, chosen: 0 })).toMatch(
      /Skill 0\.10,.*chosen nothing yet\. It steps aside/,
    )
    expect(says({ ...report, skill: null, predictions: 3, aside: true, chosen: 0 })).toMatch(/Too few/)
    expect(says(null)).toMatch(/no say here/)
    expect(says(undefined, false)).toMatch(/^None/)
  })
})

describe('the box of the composer', () => {
  it('switches it off, where the method has something to choose', async () => {
    const told: boolean[] = []
    const box = (method: 'annealing' | 'random') => (
      <SurrogateBox method={method} on onChange={(on) => told.push(on)} />
    )
    const { rerender } = render(box('annealing'))
    const input = screen.getByRole<HTMLInputElement>('checkbox', { name: 'Surrogate' })
    await userEvent.click(input)
    expect(told).toEqual([false])
    rerender(box('random'))
    expect([input.checked, input.disabled]).toEqual([false, true])
  })

  it('is off at first for tempering, where it does not pay', async () => {
    const changes: Partial<Draft>[] = []
    const draft = { method: 'annealing', surrogate: true } as Draft
    render(
      <MethodFields
        draft={draft}
        onChange={(change) => changes.push(change)}
        name=""
        onName={() => undefined}
        fault={() => null}
      />,
    )
    const method = screen.getByLabelText('Method')
    await userEvent.selectOptions(method, 'tempering')
    await userEvent.selectOptions(method, 'genetic')
    expect(changes).toEqual([
      { method: 'tempering', surrogate: false },
      { method: 'genetic', surrogate: true },
    ])
  })
})
