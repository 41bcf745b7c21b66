import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { creditMilliseconds } from '../../server/jobs/fairShares.ts'
import { Scheduler, type WorkSource } from '../../server/jobs/scheduler.ts'

interface Piece {
  readonly source: WorkSource
  readonly name: string
  readonly ends: number
  readonly finish: () => void
}

/** Threads and a clock that only a test moves: pieces take the time they say. */
class Bench {
  now = 0
  readonly started: string[] = []
  /** Thread time by the name of the source. */
  readonly used = new Map<string, number>()
  readonly scheduler: Scheduler
  readonly broken: unknown[] = []
  #inHand: Piece[] = []

  constructor(slots: number) {
    this.scheduler = new Scheduler(slots, {
      steadyClock: () => this.now,
      broken: (_source, error) => this.broken.push(error),
    })
  }

  /** A source whose pieces take `duration`, at most `atOnce` of them side by side. */
  source(
    name: string,
    { campaign, duration = 1000, atOnce = 1, pieces = Infinity, ...rest }: SourceOptions,
  ): WorkSource {
    let left = pieces
    let busy = 0
    const source: WorkSource = {
      campaignId: campaign,
      ...rest,
      next: () => {
        if (left === 0 || busy === atOnce) return null
        left -= 1
        busy += 1
        this.started.push(name)
        return new Promise((resolve) => {
          const takes = typeof duration === 'number' ? duration : duration()
          const finish = () => {
            busy -= 1
            this.used.set(name, (this.used.get(name) ?? 0) + takes)
            resolve()
          }
          this.#inHand.push({ source, name, ends: this.now + takes, finish })
        })
      },
    }
    return source
  }

  add(name: string, options: SourceOptions): WorkSource {
    const source = this.source(name, options)
    this.scheduler.add(source)
    return source
  }

  /** Lets the pieces in hand end one after the other, until the clock stands at `until`. */
  async run(until: number): Promise<void> {
    const settled = () => new Promise((resolve) => setImmediate(resolve))
    for (;;) {
      await settled()
      const [first] = this.#inHand.sort((a, b) => a.ends - b.ends)
      if (!first || first.ends > until) break
      this.now = first.ends
      this.#inHand.shift()
      first.finish()
    }
    this.now = until
  }

  get running(): number {
    return this.#inHand.length
  }

  usedBy(names: RegExp): number {
    return [...this.used].reduce((sum, [name, used]) => (names.test(name) ? sum + used : sum), 0)
  }
}

interface SourceOptions extends Pick<WorkSource, 'lane'> {
  readonly campaign: string
  readonly duration?: number | (() => number)
  readonly atOnce?: number
  readonly pieces?: number
}

describe('the scheduler', () => {
  it('never runs more pieces at once than there are slots', async () => {
    const bench = new Bench(2)
    bench.add('a', { campaign: 'one', atOnce: 5 })
    expect(bench.running).toBe(2)
    await bench.run(10_500)
    expect(bench.running).toBe(2)
    expect(bench.usedBy(/a/)).toBe(20_000)
  })

  it('gives each campaign the same thread time, whatever the number of its runs and the length of their pieces', async () => {
    const bench = new Bench(2)
    for (let i = 0; i < 30; i += 1)
      bench.add(`many ${i}`, { campaign: 'many', atOnce: 2, duration: 100 + 13 * i })
    bench.add('one', { campaign: 'one', atOnce: 2, duration: 2_900 })
    await bench.run(400_000)
    expect(bench.usedBy(/many/) / 800_000).toBeCloseTo(0.5, 1)
    expect(bench.usedBy(/one/) / 800_000).toBeCloseTo(0.5, 1)
    const runs = Array.from({ length: 30 }, (_, i) => bench.usedBy(new RegExp(`many ${i}$`)))
    // Each of the thirty has a thirtieth, but for the piece in hand.
    expect(Math.min(...runs)).toBeGreaterThan(400_000 / 30 - 500)
    expect(Math.max(...runs)).toBeLessThan(400_000 / 30 + 500)
  })

  it('divides thread time to within a piece or two, for any numbers of slots, campaigns, runs and lengths', async () => {
    const campaign = fc.array(fc.integer({ min: 50, max: 4_000 }), { minLength: 1, maxLength: 5 })
    await fc.assert(
      fc.asyncProperty(
        fc.integer({ min: 1, max: 4 }),
        fc.array(campaign, { minLength: 2, maxLength: 4 }),
        async (slots, campaigns) => {
          const bench = new Bench(slots)
          campaigns.forEach((durations, c) =>
            durations.forEach((duration, i) =>
              bench.add(`${c}/${i}`, { campaign: `${c}`, duration, atOnce: slots }),
            ),
          )
          await bench.run(120_000)
          for (const [c] of campaigns.entries()) {
            const off = bench.usedBy(new RegExp(`^${c}/`)) - (120_000 * slots) / campaigns.length
            expect(Math.abs(off)).toBeLessThan(2 * slots * 4_000)
          }
        },
      ),
      { numRuns: 25, seed: 7 },
    )
  })

  it('lets no run of one campaign wait behind the others of it', async () => {
    const bench = new Bench(1)
    for (const name of ['a', 'b', 'c']) bench.add(name, { campaign: 'one' })
    await bench.run(5_500)
    expect(bench.started).toEqual(['a', 'b', 'c', 'a', 'b', 'c'])
  })

  it('shares a campaign between kinds of work: a certificate does not wait behind ten searches', async () => {
    const bench = new Bench(1)
    for (let i = 0; i < 10; i += 1) bench.add(`search ${i}`, { campaign: 'one', lane: 'searches' })
    bench.add('certificate', { campaign: 'one', lane: 'certificates', duration: 3_000 })
    await bench.run(60_000)
    expect(bench.usedBy(/certificate/)).toBeGreaterThan(26_000)
    expect(bench.usedBy(/search/)).toBeGreaterThan(26_000)
  })

  it('gives a newcomer its share from now on, without a claim for the time before', async () => {
    const bench = new Bench(1)
    bench.add('old', { campaign: 'one' })
    await bench.run(100_000)
    bench.add('new', { campaign: 'two' })
    await bench.run(110_500)
    expect(bench.started.slice(-10).filter((name) => name === 'new')).toHaveLength(5)
  })

  it('takes up no more than a limited claim for turns that were let go by', async () => {
    const bench = new Bench(1)
    bench.add('steady', { campaign: 'one' })
    let open = false
    const waiting = bench.source('waiting', { campaign: 'two' })
    const source: WorkSource = { ...waiting, next: () => (open ? waiting.next() : null) }
    bench.scheduler.add(source)
    await bench.run(60_500)
    open = true
    const before = bench.started.length
    await bench.run(80_500)
    const first = bench.started.slice(before).indexOf('steady')
    expect(first).toBeLessThanOrEqual(creditMilliseconds / 1000 + 1)
    expect(first).toBeGreaterThan(1)
  })

  it('forgets no debt when a run is taken away and comes again', async () => {
    const bench = new Bench(1)
    bench.add('long', { campaign: 'one', duration: 10_000, pieces: 1 })
    const b = bench.add('b', { campaign: 'two' })
    await bench.run(10_500)
    bench.add('again', { campaign: 'one' })
    await bench.run(18_500)
    expect(bench.started).not.toContain('again')
    bench.scheduler.remove(b)
    await bench.run(20_500)
    expect(bench.started.at(-1)).toBe('again')
  })

  it('gives the slots of a removed source to the others', async () => {
    const bench = new Bench(1)
    const first = bench.add('a', { campaign: 'one' })
    bench.add('b', { campaign: 'two' })
    bench.scheduler.remove(first)
    await bench.run(3_500)
    expect(bench.started).toEqual(['a', 'b', 'b', 'b'])
  })

  it('says who is next', async () => {
    const bench = new Bench(1)
    const [a1, a2] = ['a1', 'a2'].map((name) => bench.add(name, { campaign: 'one', atOnce: 2 }))
    const b = bench.add('b', { campaign: 'two' })
    const c = bench.add('c', { campaign: 'one', lane: 'counts' })
    const places = () => [a1, a2, b, c].map((source) => bench.scheduler.standings().get(source))
    const waits = (place: number) => ({ inHand: 0, place })
    const works = { inHand: 1, place: null }
    expect(places()).toEqual([works, waits(3), waits(1), waits(2)])
    await bench.run(2_500)
    expect(bench.started).toEqual(['a1', 'b', 'c'])
  })

  it('starts nothing while it is held, nor after it was stopped', async () => {
    const bench = new Bench(1)
    bench.add('a', { campaign: 'one' })
    bench.scheduler.hold()
    await bench.run(2_500)
    expect(bench.started).toEqual(['a'])
    bench.scheduler.release()
    expect(bench.started).toEqual(['a', 'a'])
    bench.scheduler.stop()
    await bench.run(9_500)
    expect(bench.started).toEqual(['a', 'a'])
  })

  it('goes on without a source that breaks its promise', async () => {
    const bench = new Bench(1)
    bench.scheduler.add({ campaignId: 'one', next: () => Promise.reject(new Error('a bug')) })
    bench.scheduler.add({
      campaignId: 'one',
      next: () => {
        throw new Error('another')
      },
    })
    bench.add('sound', { campaign: 'one' })
    await bench.run(2_500)
    expect(bench.broken).toHaveLength(2)
    expect(bench.usedBy(/sound/)).toBeGreaterThanOrEqual(2_000)
  })
})
