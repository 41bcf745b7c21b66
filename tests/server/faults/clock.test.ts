import { afterEach, describe, expect, it, vi } from 'vitest'
import { pieceLength } from '../../../server/jobs/compute/pieceLength.ts'
import { LeaseWatch, leaseMilliseconds, thisProcess } from '../../../server/jobs/lease.ts'
import { openSmallHunt } from '../support/smallHunt.ts'

afterEach(() => vi.restoreAllMocks())

const days = 24 * 3600 * 1000

describe('the length of a piece of work', () => {
  it('counts from its first step, and is three times what it took to get there', () => {
    let now = 100
    const quick = pieceLength(1000, 90, () => now)
    const slow = pieceLength(1000, 100 - 2_000, () => now)
    const slowest = pieceLength(1000, 100 - 200_000, () => now)
    const over = () => [quick, slow, slowest].map((enough) => enough())
    expect(over()).toEqual([false, false, false])
    now += 1_001
    expect(over()).toEqual([true, false, false])
    now += 5_000
    expect(over()).toEqual([true, true, false])
    now += 24_000
    expect(over()).toEqual([true, true, true])
  })
})

describe('a lease', () => {
  const other = { leaseOwner: 'elsewhere/17/a-process', leaseBeat: 5 }

  it('of another machine is left alone while it beats, and taken for left behind after none for long enough', () => {
    let now = 0
    const watch = new LeaseWatch(() => now)
    expect(watch.isFree('x', other)).toBe(false)
    now += leaseMilliseconds - 1
    expect(watch.isFree('x', { ...other, leaseBeat: 6 })).toBe(false)
    now += leaseMilliseconds - 1
    expect(watch.isFree('x', { ...other, leaseBeat: 6 })).toBe(false)
    now += 1
    expect(watch.isFree('x', { ...other, leaseBeat: 6 })).toBe(true)
  })

  it('is not measured by the time of day', () => {
    let now = 0
    const watch = new LeaseWatch(() => now)
    expect(watch.isFree('x', other)).toBe(false)
    vi.spyOn(Date, 'now').mockReturnValue(Date.now() + 40 * days)
    now += 1000
    expect(watch.isFree('x', other)).toBe(false)
    vi.spyOn(Date, 'now').mockReturnValue(0)
    now += leaseMilliseconds
    expect(watch.isFree('x', other)).toBe(true)
  })

  it('of a process of this machine that has ended is free at once, and so is our own', () => {
    const watch = new LeaseWatch(() => 0)
    const [machine] = thisProcess.split('/')
    expect(watch.isFree('x', { leaseOwner: thisProcess, leaseBeat: 1 })).toBe(true)
    // An earlier process with our number.
    expect(watch.isFree('x', { leaseOwner: `${machine}/${process.pid}/before`, leaseBeat: 1 })).toBe(true)
    // No process has the number 2^22 + 1 on Linux.
    expect(watch.isFree('x', { leaseOwner: `${machine}/4194305/gone`, leaseBeat: 1 })).toBe(true)
    expect(watch.isFree('x', { leaseOwner: `${machine}/${process.ppid}/alive`, leaseBeat: 1 })).toBe(false)
  })
})

describe('a time of day that jumps by days, forwards and back', () => {
  it('changes nothing of a search under way', async () => {
    const hunt = await openSmallHunt({ segmentMilliseconds: 20 })
    try {
      const settings = { seed: 41, budget: 100 }
      const undisturbed = await hunt.finished((await hunt.start(settings)).id)
      const real = Date.now.bind(Date)
      let offset = 0
      let calls = 0
      vi.spyOn(Date, 'now').mockImplementation(() => {
        calls += 1
        // Every few readings another jump, up to six days either way: sessions, which last two weeks, live on.
        if (calls % 3 === 0) offset = ((calls * 7919) % 13) * days - 6 * days
        return real() + offset
      })
      const { id } = await hunt.start(settings)
      const done = await hunt.finished(id)
      expect(done.state).toBe('finished')
      expect(done.top).toEqual(undisturbed.top)
      const { evaluationsPerSecond, secondsLeft } = done.progress
      expect(secondsLeft).toBe(0)
      expect(evaluationsPerSecond === null || evaluationsPerSecond > 0).toBe(true)
    } finally {
      vi.restoreAllMocks()
      await hunt.close()
    }
  }, 240_000)
})
