import { describe, expect, it } from 'vitest'
import { readersAfter, type Standing } from '../../../server/services/secondReading.ts'

const person = (id: string) => ({ id, name: id.toUpperCase() })
const verified = (readers: readonly string[] | null, author = 'a', targetVersionId = 'v'): Standing => ({
  value: 'verified',
  readers: readers && readers.map(person),
  author: person(author),
  targetVersionId,
})
const given = (id: string, value: Standing['value'] = 'verified') => ({
  value,
  author: person(id),
  targetVersionId: 'v',
})
const ids = (readers: ReturnType<typeof readersAfter>) => readers?.map(({ id }) => id) ?? null

describe('the second reader', () => {
  it('is not asked for: no readers are kept', () => {
    expect(readersAfter(false, verified(['a']), given('b'))).toBeNull()
  })

  it('counts two different people, and nobody twice', () => {
    expect(ids(readersAfter(true, null, given('a')))).toEqual(['a'])
    expect(ids(readersAfter(true, verified(['a']), given('b')))).toEqual(['a', 'b'])
    expect(ids(readersAfter(true, verified(['a']), given('a')))).toEqual(['a'])
    expect(ids(readersAfter(true, verified(['a', 'b']), given('a')))).toEqual(['b', 'a'])
  })

  it('begins anew after another verdict, and for another version', () => {
    const rejected: Standing = { ...verified(null), value: 'rejected' }
    expect(ids(readersAfter(true, rejected, given('b')))).toEqual(['b'])
    expect(ids(readersAfter(true, verified(['a'], 'a', 'other'), given('b')))).toEqual(['b'])
  })

  it('takes one of before as its author’s', () => {
    expect(ids(readersAfter(true, verified(null, 'a'), given('b')))).toEqual(['a', 'b'])
    expect(ids(readersAfter(true, verified(null, 'a'), given('a')))).toEqual(['a'])
  })

  it('is nobody’s business for a rejection', () => {
    expect(readersAfter(true, verified(['a']), given('b', 'rejected'))).toBeNull()
  })
})
