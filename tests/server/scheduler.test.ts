import { describe, expect, it } from 'vitest'
import { Scheduler, type WorkSource } from '../../server/jobs/scheduler.ts'

interface Script {
  readonly started: string[]
  finish(): void
}

/** A source with a number of pieces, each ended by hand. */
function source(
  name: string,
  campaignId: string,
  pieces: number,
  script: Script & { ends: (() => void)[] },
): WorkSource {
  let left = pieces
  return {
    campaignId,
    next() {
      if (left === 0) return null
      left -= 1
      script.started.push(name)
      return new Promise((resolve) => script.ends.push(resolve))
    },
  }
}

function newScript() {
  const ends: (() => void)[] = []
  return { started: [] as string[], ends, finish: () => ends.shift()?.() }
}

const settle = () => new Promise((resolve) => setImmediate(resolve))

describe('the scheduler', () => {
  it('never runs more pieces at once than there are slots', async () => {
    const script = newScript()
    const scheduler = new Scheduler(2)
    scheduler.add(source('a', 'one', 5, script))
    expect(script.started).toHaveLength(2)
    script.finish()
    await settle()
    expect(script.started).toHaveLength(3)
  })

  it('takes turns between campaigns, whatever the number of their searches', async () => {
    const script = newScript()
    const scheduler = new Scheduler(1)
    scheduler.add(source('a1', 'one', 9, script))
    scheduler.add(source('a2', 'one', 9, script))
    scheduler.add(source('b', 'two', 9, script))
    for (let i = 0; i < 7; i += 1) {
      script.finish()
      await settle()
    }
    expect(script.started).toEqual(['a1', 'b', 'a2', 'b', 'a1', 'b', 'a2', 'b'])
  })

  it('gives the slots of a removed source to the others', async () => {
    const script = newScript()
    const scheduler = new Scheduler(1)
    const first = source('a', 'one', 9, script)
    scheduler.add(first)
    scheduler.add(source('b', 'two', 9, script))
    scheduler.remove(first)
    for (let i = 0; i < 3; i += 1) {
      script.finish()
      await settle()
    }
    expect(script.started).toEqual(['a', 'b', 'b', 'b'])
  })

  it('starts nothing after it was stopped', async () => {
    const script = newScript()
    const scheduler = new Scheduler(1)
    scheduler.add(source('a', 'one', 9, script))
    scheduler.stop()
    script.finish()
    await settle()
    expect(script.started).toEqual(['a'])
  })
})
