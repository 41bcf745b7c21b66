import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import request from 'supertest'
import { describe, expect, it } from 'vitest'
import {
  checkRule,
  FormCache,
  normalForm,
  nullSample,
  polytopeFromPoints,
  polytopeSource,
} from '../../scoring/index.ts'
import { readConfig } from '../../server/config.ts'
import { announce, hasDemo, runDemoSearch, seedDemo } from '../../server/library/demo.ts'
import { demoPassword, demoSearch, demoTargets, demoTeam } from '../../server/library/demoTeam.ts'
import { openServer, refuseExposedDemo } from '../../server/start.ts'
import { builtWorker } from './support/builtWorker.ts'
import { bundledEntries, loadEntries } from './support/bundledSample.ts'

/** A server on an empty database, as at the first start. */
async function firstStart<T>(
  environment: Record<string, string>,
  run: (server: Awaited<ReturnType<typeof openServer>>) => Promise<T>,
): Promise<T> {
  const folder = mkdtempSync(join(tmpdir(), 'tessellary-demo-'))
  const config = readConfig({
    DATA_DIR: folder,
    LOG_LEVEL: 'silent',
    NODE_ENV: 'development',
    ...environment,
  })
  const server = await openServer(config, {
    inMemory: true,
    checkAnswers: true,
    jobs: { ...builtWorker, nullSize: () => 20 },
  })
  try {
    return await run(server)
  } finally {
    await server.close()
    rmSync(folder, { recursive: true, force: true })
  }
}

describe('the first start', () => {
  it('makes a team of one per role, a campaign, two targets, and a search with its shortlist', async () => {
    await firstStart({}, async (server) => {
      const { context, app } = server
      const demo = await seedDemo(context)
      if (demo === null) throw new Error('nothing was seeded')
      expect(demoTeam.map(({ role }) => role).sort()).toEqual(['investigator', 'lead', 'reader', 'reviewer'])
      expect(await seedDemo(context)).toBeNull()
      await loadEntries(
        server,
        bundledEntries('large', (id) => id === demoSearch.polytopeName),
      )
      const agent = request.agent(app)
      await agent.post('/api/session').send({ email: demoTeam[0].email, password: demoPassword }).expect(200)
      const search = runDemoSearch(context, demo)
      await expect
        .poll(async () => (await agent.get(`/api/campaigns/${demo.campaignId}`)).body.runningSearches)
        .toBe(1)
      await search
      const { body } = await agent.get(`/api/campaigns/${demo.campaignId}`).expect(200)
      expect(body).toMatchObject({ targets: 2, searches: 1, shortlists: 1, undecided: 40 })
      expect(body.searchList[0]).toMatchObject({ state: 'finished', evaluations: demoSearch.budget })
    })
  }, 180_000)

  it('makes no demo accounts in production, and none beside real ones', async () => {
    const secret = 'a secret of at least thirty-two characters'
    await firstStart({ NODE_ENV: 'production', SESSION_SECRET: secret }, async ({ context }) => {
      expect(await seedDemo(context)).toBeNull()
      expect(await hasDemo(context)).toBe(false)
    })
  })

  it('does not let others than this machine reach demo accounts', async () => {
    await firstStart({ HOST: '0.0.0.0' }, async ({ context }) => {
      await refuseExposedDemo(context)
      await seedDemo(context)
      await expect(refuseExposedDemo(context)).rejects.toThrow(/HOST is 0\.0\.0\.0.*demo accounts/)
    })
  })

  it('prints the address and the sign-in in one block', () => {
    const block = announce('http://127.0.0.1:4280', true)
    expect(block).toContain('http://127.0.0.1:4280')
    for (const { email, role } of demoTeam) expect(block).toMatch(new RegExp(`${email}\\s+${role}`))
    expect(block).toContain(demoPassword)
    expect(announce('http://127.0.0.1:4280', false)).not.toContain(demoPassword)
  })
})

describe('the demo targets', () => {
  const hitRate = (
    text: string,
    entries: ReturnType<typeof bundledEntries>,
    size: number,
  ): number | undefined => {
    const check = checkRule(text)
    if (!check.ok) throw new Error(check.issues[0].message)
    const polytopes = entries.map(({ vertices }) => ({ key: keyOf(vertices), vertices }))
    const scope = { polytopes: polytopeSource(polytopes, new FormCache(500)), rule: check.rule }
    return nullSample(scope, 1, size).summary.hit?.rate
  }
  const keyOf = (vertices: number[][]) => normalForm(polytopeFromPoints(vertices)).key

  const [range, fibres] = demoTargets
  it.each([
    [range.name, range.text, bundledEntries('large', (id) => id === demoSearch.polytopeName), 400],
    [fibres.name, fibres.text, bundledEntries('small', (id) => /^r4-.*[05]$/.test(id)), 300],
  ])('"%s" is hit by one in a thousand to one in twenty of the null', (_name, text, entries, size) => {
    const rate = hitRate(text, entries, size)
    expect(rate).toBeGreaterThan(0.001)
    expect(rate).toBeLessThan(0.05)
  })
})
