// @vitest-environment happy-dom
import { describe, expect, it } from 'vitest'
import { QueryClient } from '@tanstack/react-query'
import { type SearchDetail, type SearchProgress } from '../../shared/searches.ts'
import { type ShortlistDetail } from '../../shared/shortlists.ts'
import { key, row, shortlist, verdict } from './shortlistFixture.ts'
import { applyEvent } from '../../src/api/liveEvents.ts'

const progress = (evaluations: number, best: number | null, bestKey: string | null): SearchProgress => ({
  evaluations,
  proposals: evaluations * 2,
  accepted: evaluations,
  restarts: 0,
  feasible: evaluations,
  infeasible: 0,
  undefined: 0,
  best,
  bestKey,
  curve: best === null ? [] : [[evaluations, best]],
  islands: [],
  exhausted: false,
  evaluationsPerSecond: 10,
  secondsLeft: 5,
})

const search = {
  id: 's1',
  state: 'running',
  evaluations: 10,
  best: -6,
  progress: progress(10, -6, 'k1'),
} as SearchDetail

describe('events in the cache', () => {
  it('put a verdict into the lists of its target, unless a later one is there', () => {
    const client = new QueryClient()
    const list = shortlist([row(1, -4), row(2, -5)])
    client.setQueryData(['shortlist', 'l1'], list)
    client.setQueryData(['shortlist', 'l2'], { ...list, id: 'l2', targetVersion: 2, targetVersionId: 'tv2' })
    client.setQueryData(['shortlist', 'l3'], { ...list, id: 'l3', targetId: 't9' })
    const told = (id: string, value: 'verified' | 'rejected') =>
      applyEvent(client, 'c1', {
        kind: 'verdict',
        candidateKey: key(2),
        verdict: { ...verdict(value), id },
      })
    told('7', 'rejected')
    told('6', 'verified')
    const read = (id: string) => client.getQueryData<ShortlistDetail>(['shortlist', id])
    for (const id of ['l1', 'l2']) {
      expect(read(id)).toMatchObject({ rejected: 1, undecided: 1, verified: 0 })
      expect(read(id)?.rows[1]?.verdict).toMatchObject({ id: '7', value: 'rejected' })
    }
    expect(read('l3')?.rows[1]?.verdict).toBeNull()
  })

  it('move a search and its line in the list', () => {
    const client = new QueryClient()
    client.setQueryData(['search', 's1'], search)
    client.setQueryData(['searches', 'c1'], [search])
    applyEvent(client, 'c1', {
      kind: 'search',
      id: 's1',
      state: 'finished',
      progress: progress(50, -5, 'k2'),
    })
    expect(client.getQueryData(['search', 's1'])).toMatchObject({
      state: 'finished',
      evaluations: 50,
      best: -5,
    })
    expect(client.getQueryData(['searches', 'c1'])).toMatchObject([
      { id: 's1', state: 'finished', evaluations: 50 },
    ])
  })

  it('ask for the list of best candidates anew only when there is a new best or a new state', () => {
    const client = new QueryClient()
    client.setQueryData(['search', 's1'], search)
    const stale = () => client.getQueryState(['search', 's1'])?.isInvalidated
    applyEvent(client, 'c1', { kind: 'search', id: 's1', state: 'running', progress: progress(20, -6, 'k1') })
    expect(stale()).toBe(false)
    applyEvent(client, 'c1', {
      kind: 'search',
      id: 's1',
      state: 'running',
      progress: progress(30, -5.5, 'k9'),
    })
    expect(stale()).toBe(true)
  })

  it('never make up a search that is not there', () => {
    const client = new QueryClient()
    applyEvent(client, 'c1', { kind: 'search', id: 's1', state: 'running', progress: progress(20, -6, 'k1') })
    expect(client.getQueryData(['search', 's1'])).toBeUndefined()
  })

  it('move the progress of the library while it is loaded, and fetch it anew at the end', () => {
    const client = new QueryClient()
    const key = ['polytopes', 'hodge', {}]
    client.setQueryData(key, { total: 5, counts: [], loading: { loaded: 5, total: 100 } })
    applyEvent(client, 'c1', { kind: 'library', loaded: 50, total: 100 })
    expect(client.getQueryData(key)).toMatchObject({ loading: { loaded: 50, total: 100 } })
    expect(client.getQueryState(key)?.isInvalidated).toBe(false)
    applyEvent(client, 'c1', { kind: 'library', loaded: 100, total: 100 })
    expect(client.getQueryState(key)?.isInvalidated).toBe(true)
  })

  it('move the numbers that are still being computed, and fetch the library anew at the end', () => {
    const client = new QueryClient()
    const key = ['polytopes', 'hodge', {}]
    client.setQueryData(key, { total: 5, counts: [], loading: null, undescribed: 0 })
    applyEvent(client, 'c1', { kind: 'undescribed', left: 40 })
    expect(client.getQueryData(key)).toMatchObject({ undescribed: 40 })
    applyEvent(client, 'c1', { kind: 'undescribed', left: 0 })
    expect(client.getQueryState(key)?.isInvalidated).toBe(true)
  })

  it('move a count of classes, and fetch its result when it has ended', () => {
    const client = new QueryClient()
    const [mine, other] = ['p1', 'p2'].map((polytope) => ['polytope-classes', polytope, 'c1'])
    for (const key of [mine, other]) client.setQueryData(key, { classes: null, counting: { seen: 0 } })
    applyEvent(client, 'c1', { kind: 'class-count', key: 'p1', seen: 400, ended: false })
    expect(client.getQueryData(mine)).toMatchObject({ counting: { seen: 400 } })
    expect(client.getQueryData(other)).toMatchObject({ counting: { seen: 0 } })
    expect(client.getQueryState(mine)?.isInvalidated).toBe(false)
    applyEvent(client, 'c1', { kind: 'class-count', key: 'p1', seen: 450, ended: true })
    expect(client.getQueryState(mine)?.isInvalidated).toBe(true)
  })
})
