import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { SearchDetail } from '../../../shared/searches.ts'
import { openSmallHunt, type SmallHunt } from '../support/smallHunt.ts'

let hunt: SmallHunt
beforeAll(async () => {
  hunt = await openSmallHunt({ segmentMilliseconds: 20 })
})
afterAll(() => hunt.close())

const query = async <Row>(sql: string) => hunt.server.context.source.query<Row[]>(sql)

/** SQLite then answers as it does when the disk has no room for another page. */
async function fillDisk(): Promise<void> {
  const [{ page_count: pages }] = await query<{ page_count: number }>('PRAGMA page_count')
  await query(`PRAGMA max_page_count = ${pages}`)
  // What the last page has left is used up, too.
  await query('CREATE TABLE filler (bytes BLOB)').catch(() => undefined)
  for (const size of [4096, 1024, 256, 64, 16, 1]) {
    for (;;) {
      const full = await query(`INSERT INTO filler VALUES (zeroblob(${size}))`).then(
        () => false,
        () => true,
      )
      if (full) break
    }
  }
}
const makeRoom = () => query('PRAGMA max_page_count = 1000000')

/** What does not depend on the time a run took. */
const result = ({ state, top, progress }: SearchDetail) => ({
  state,
  top,
  progress: { ...progress, evaluationsPerSecond: null, secondsLeft: null },
})

describe('a full disk', () => {
  it('holds searches up, says so, and lets them go on to the same end when there is room', async () => {
    const { start, told, read, finished, path, lead, server } = hunt
    const settings = { seed: 31, budget: 150, keep: 200 }
    const undisturbed = await finished((await start(settings)).id)
    const { id } = await start({ ...settings, name: 'Held up' })
    await told(id, ({ progress }) => progress.evaluations > 0)
    const held = hunt.stream.event(
      (event) => event.kind === 'changed' && server.context.jobs.storage.trouble !== null,
    )
    // Not so fast: the search must not end before the disk is full.
    server.context.jobs.scheduler.hold()
    await fillDisk()
    server.context.jobs.scheduler.release()
    await held
    const before = await read(id)
    expect(before).toMatchObject({ state: 'running', standing: { kind: 'held', code: 'storage-full' } })
    expect(before.evaluations).toBeLessThan(150)

    // What a person asks for is refused for the time being, and not taken for a bug.
    const refused = await lead
      .post(path('/targets'))
      .send({ name: 'No room', text: `score 1 # ${'x'.repeat(5000)}` })
    expect([refused.status, refused.body.code]).toEqual([503, 'storage-full'])
    await lead.get('/api/health').expect(200)

    await makeRoom()
    const done = await finished(id)
    expect(result(done)).toEqual(result(undisturbed))
    expect(server.context.jobs.storage.trouble).toBeNull()
    // Nothing was left open in which all of this would be lost.
    await query('BEGIN')
    await query('ROLLBACK')
    expect(await query('PRAGMA integrity_check')).toEqual([{ integrity_check: 'ok' }])
    await lead.post(path('/targets')).send({ name: 'Room again', text: 'score 1' }).expect(201)
  }, 240_000)
})
