import katex from 'katex'
import { describe, expect, it } from 'vitest'
import type { Described } from '../../../scoring/observables/observable.ts'
import { STAGES } from '../../../scoring/observables/observable.ts'
import { findField, findObservable, OBSERVABLES, recordSet } from '../../../scoring/observables/registry.ts'

const everything: { readonly id: string; readonly entry: Described }[] = OBSERVABLES.flatMap((observable) => [
  { id: observable.name, entry: observable as Described },
  ...(observable.kind === 'records'
    ? observable.fields.map((field) => ({
        id: `${observable.name}.${field.name}`,
        entry: field as Described,
      }))
    : []),
])

describe('the registry of observables', () => {
  it.each(everything)('describes $id completely', ({ entry }) => {
    expect(entry.name).toMatch(/^[a-z][a-zA-Z0-9]*(\.[a-z][a-zA-Z0-9]*)*$/)
    expect(entry.description).toMatch(/\.$/)
    expect(entry.description.split('\n')).toHaveLength(1)
    expect(entry.source.length).toBeGreaterThan(5)
    expect(entry.unit.length).toBeGreaterThan(0)
    expect(STAGES).toContain(entry.stage)
    expect(entry.version).toBeGreaterThanOrEqual(1)
    expect(() => katex.renderToString(entry.formula, { throwOnError: true })).not.toThrow()
  })

  it('declares how each dimensionful quantity moves along the ray', () => {
    const powers = new Map([
      ['l_s^6', 3],
      ['l_s^4', 2],
      ['l_s^2', 1],
      ['M_pl^2', -4],
      ['1', 0],
    ])
    for (const { id, entry } of everything)
      expect([id, entry.scaling]).toEqual([
        id,
        entry.stage === 'axions' ? 'computed' : powers.get(entry.unit),
      ])
  })

  it('has unique names, and every set that fields and relations refer to', () => {
    expect(new Set(everything.map(({ id }) => id)).size).toBe(everything.length)
    for (const observable of OBSERVABLES) {
      if (observable.kind === 'relation')
        observable.parameters.forEach((parameter) => recordSet(parameter.of))
      if (observable.kind === 'records')
        for (const field of observable.fields) if (field.kind !== 'value') recordSet(field.of)
    }
    expect(() => recordSet('volume')).toThrow('no set of records')
  })

  it('finds what it has and nothing that hosts have', () => {
    expect(findObservable('volume')?.kind).toBe('scalar')
    expect(findField(recordSet('divisors'), 'k3')?.kind).toBe('value')
    for (const name of ['constructor', '__proto__', 'toString', ''])
      expect([findObservable(name), findField(recordSet('divisors'), name)]).toEqual([undefined, undefined])
  })
})
