import request, { type Test } from 'supertest'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { roles, type Role } from '../../shared/roles.ts'
import { listRoutes } from './support/listRoutes.ts'
import { openTestServer, type Agent, type TestServer } from './support/testServer.ts'

type Who = 'open' | 'account' | readonly Role[]

const everyone: readonly Role[] = ['lead', 'investigator', 'reviewer', 'reader']
const builders: readonly Role[] = ['lead', 'investigator']
const lead: readonly Role[] = ['lead']
const judges: readonly Role[] = ['lead', 'investigator', 'reviewer']

/** Every route and who may use it. A route that is not here fails the first test. */
const table: readonly (readonly [string, Who])[] = [
  ['GET /api/health', 'open'],
  ['GET /api/session', 'open'],
  ['POST /api/session', 'open'],
  ['DELETE /api/session', 'account'],
  ['POST /api/setup', 'open'],
  ['GET /api/events', 'account'],
  ['GET /api/polytopes', 'account'],
  ['GET /api/polytopes/hodge', 'account'],
  ['GET /api/polytopes/:key', 'account'],
  ['GET /api/polytopes/:key/structure', 'account'],
  ['GET /api/polytopes/:key/null-spectra', 'account'],
  ['GET /api/polytopes/:key/classes', 'account'],
  ['POST /api/polytopes/find', 'account'],
  ['GET /api/candidates/pictures', 'account'],
  ['GET /api/collections', 'account'],
  ['GET /api/candidates/:key/relatives', 'account'],
  ['GET /api/candidates/:key', 'account'],
  ['GET /api/candidates/:key/spectra', 'account'],
  ['GET /api/candidates/:key/alignment/:other', 'account'],
  ['GET /api/candidates/:key/slice', 'account'],
  ['GET /api/candidates/:key/certificates', 'account'],
  ['GET /api/candidates/:key/certificates/:certificate', 'account'],
  ['GET /api/campaigns', 'account'],
  ['POST /api/campaigns', 'account'],
  ['GET /api/campaigns/:campaign', everyone],
  ['PATCH /api/campaigns/:campaign', lead],
  ['POST /api/campaigns/:campaign/members', lead],
  ['PATCH /api/campaigns/:campaign/members/:account', lead],
  ['DELETE /api/campaigns/:campaign/members/:account', lead],
  ['POST /api/campaigns/:campaign/polytopes', builders],
  ['POST /api/campaigns/:campaign/polytopes/upload', builders],
  ['POST /api/campaigns/:campaign/polytopes/weights', builders],
  ['POST /api/campaigns/:campaign/polytopes/weight-lines', builders],
  ['GET /api/campaigns/:campaign/imported-candidates', everyone],
  ['POST /api/campaigns/:campaign/imported-candidates', builders],
  ['POST /api/campaigns/:campaign/imported-candidates/upload', builders],
  ['DELETE /api/campaigns/:campaign/imported-candidates/:key', builders],
  ['POST /api/campaigns/:campaign/imported-candidates/shortlists', builders],
  ['POST /api/campaigns/:campaign/polytopes/:key/count', everyone],
  ['POST /api/campaigns/:campaign/scope', everyone],
  ['POST /api/campaigns/:campaign/collections', builders],
  ['PATCH /api/campaigns/:campaign/collections/:collection', builders],
  ['DELETE /api/campaigns/:campaign/collections/:collection', builders],
  ['POST /api/campaigns/:campaign/collections/:collection/add', builders],
  ['POST /api/campaigns/:campaign/collections/:collection/remove', builders],
  ['POST /api/campaigns/:campaign/collections/:collection/publish', lead],
  ['POST /api/campaigns/:campaign/collections/:collection/withdraw', lead],
  ['GET /api/campaigns/:campaign/targets', everyone],
  ['POST /api/campaigns/:campaign/targets', builders],
  ['GET /api/campaigns/:campaign/targets/:target', everyone],
  ['GET /api/campaigns/:campaign/targets/:target/uses', everyone],
  ['PATCH /api/campaigns/:campaign/targets/:target', builders],
  ['POST /api/campaigns/:campaign/targets/:target/versions', builders],
  ['POST /api/campaigns/:campaign/rules/check', everyone],
  ['POST /api/campaigns/:campaign/previews', everyone],
  ['GET /api/campaigns/:campaign/previews/:preview', everyone],
  ['DELETE /api/campaigns/:campaign/previews', everyone],
  ['POST /api/campaigns/:campaign/explorations', everyone],
  ['GET /api/campaigns/:campaign/explorations/:exploration', everyone],
  ['DELETE /api/campaigns/:campaign/explorations/:exploration', everyone],
  ['GET /api/campaigns/:campaign/explorations/:exploration/rows', everyone],
  ['POST /api/campaigns/:campaign/explorations/:exploration/candidates', everyone],
  ['GET /api/campaigns/:campaign/explorations/:exploration/export.csv', everyone],
  ['GET /api/campaigns/:campaign/explorations/:exploration/export.json', everyone],
  ['GET /api/campaigns/:campaign/searches', everyone],
  ['POST /api/campaigns/:campaign/searches', builders],
  ['GET /api/campaigns/:campaign/comparisons', everyone],
  ['GET /api/campaigns/:campaign/searches/:search', everyone],
  ['POST /api/campaigns/:campaign/searches/:search/pause', builders],
  ['POST /api/campaigns/:campaign/searches/:search/resume', builders],
  ['POST /api/campaigns/:campaign/searches/:search/cancel', builders],
  ['POST /api/campaigns/:campaign/searches/:search/extend', builders],
  ['GET /api/campaigns/:campaign/searches/:search/spec.json', everyone],
  ['POST /api/campaigns/:campaign/search-starts', everyone],
  ['POST /api/campaigns/:campaign/search-costs', builders],
  ['POST /api/campaigns/:campaign/search-results', builders],
  ['POST /api/campaigns/:campaign/search-results/upload', builders],
  ['GET /api/campaigns/:campaign/shortlists', everyone],
  ['POST /api/campaigns/:campaign/shortlists', builders],
  ['POST /api/campaigns/:campaign/shortlists/draft', everyone],
  ['GET /api/campaigns/:campaign/rescorings', everyone],
  ['POST /api/campaigns/:campaign/rescorings', builders],
  ['POST /api/campaigns/:campaign/rescorings/:rescoring/cancel', builders],
  ['GET /api/campaigns/:campaign/external-tables', everyone],
  ['POST /api/campaigns/:campaign/external-tables', judges],
  ['DELETE /api/campaigns/:campaign/external-tables/:table', judges],
  ['GET /api/campaigns/:campaign/shortlists/:shortlist', everyone],
  ['GET /api/campaigns/:campaign/shortlists/:shortlist/export.csv', everyone],
  ['GET /api/campaigns/:campaign/shortlists/:shortlist/export.json', everyone],
  ['GET /api/campaigns/:campaign/candidates/:key', everyone],
  ['GET /api/campaigns/:campaign/candidates/:key/score', everyone],
  ['POST /api/campaigns/:campaign/candidates/:key/verdicts', judges],
  ['POST /api/campaigns/:campaign/verdicts', judges],
  ['POST /api/campaigns/:campaign/assignments', judges],
  ['GET /api/campaigns/:campaign/shortlist-views', everyone],
  ['POST /api/campaigns/:campaign/shortlist-views', judges],
  ['PATCH /api/campaigns/:campaign/shortlist-views/:view', judges],
  ['DELETE /api/campaigns/:campaign/shortlist-views/:view', judges],
  ['POST /api/campaigns/:campaign/shortlists/:shortlist/reissues', builders],
  ['POST /api/campaigns/:campaign/verdicts/undo', judges],
  ['GET /api/campaigns/:campaign/candidates/:key/comments', everyone],
  ['POST /api/campaigns/:campaign/candidates/:key/comments', judges],
  ['PATCH /api/campaigns/:campaign/comments/:comment', judges],
  ['DELETE /api/campaigns/:campaign/comments/:comment', judges],
  ['GET /api/campaigns/:campaign/mentions', everyone],
  ['POST /api/campaigns/:campaign/mentions/:comment/seen', everyone],
  ['GET /api/campaigns/:campaign/candidates/:key/certificates', everyone],
  ['GET /api/campaigns/:campaign/certifications', everyone],
  ['POST /api/campaigns/:campaign/certifications', judges],
  ['POST /api/campaigns/:campaign/certifications/:certification/cancel', judges],
]

const noCampaign = 'There is no such campaign.'

describe('every route', () => {
  let server: TestServer
  const agents = new Map<Role | 'stranger', Agent>()

  beforeAll(async () => {
    server = await openTestServer()
    for (const name of [...roles, 'stranger'] as const) agents.set(name, await server.signIn(name))
  })
  afterAll(() => server.close())

  /** Calls a route with made-up identifiers and, where it takes one, an empty body. */
  const call = (agent: Agent | ReturnType<typeof request>, route: string): Test => {
    const [method, path] = route.split(' ')
    const address = path
      .replace(':campaign', server.campaignId)
      .replace(/:\w+/g, '0123456789abcdef0123456789abcdef')
    if (method === 'GET') return agent.get(address)
    if (method === 'POST') return agent.post(address).send({})
    if (method === 'PATCH') return agent.patch(address).send({})
    return agent.delete(address)
  }

  const as = (name: Role | 'stranger'): Agent => {
    const agent = agents.get(name)
    if (!agent) throw new Error(`nobody signed in as ${name}`)
    return agent
  }

  it('is in the table, and the table holds no other', () => {
    const registered = listRoutes(server.app).filter((route) => route.includes(' /api'))
    expect(registered.sort()).toEqual(table.map(([route]) => route).sort())
  })

  const closed = table.filter(([, who]) => who !== 'open')
  it.each(closed)('%s asks who is calling (401)', async (route) => {
    const response = await call(request(server.app), route)
    expect(response.status).toBe(401)
    expect(response.headers['content-type']).toMatch(/^application\/problem\+json/)
    expect(response.body).toMatchObject({ status: 401, code: 'not-signed-in' })
  })

  const ofCampaigns = table.filter((row): row is [string, readonly Role[]] => typeof row[1] === 'object')
  it.each(ofCampaigns)('%s does not exist for a stranger to the campaign (404)', async (route) => {
    const response = await call(as('stranger'), route)
    expect(response.status).toBe(404)
    expect(response.body).toMatchObject({ code: 'not-found', detail: noCampaign })
  })

  it.each(ofCampaigns)('%s refuses the wrong roles (403) and lets in %j', async (route, allowed) => {
    for (const role of roles) {
      const { status, body } = await call(as(role), route)
      if (allowed.includes(role)) {
        expect([401, 403], `${route} as ${role}`).not.toContain(status)
        expect(body.detail, `${route} as ${role}`).not.toBe(noCampaign)
        expect(status, `${route} as ${role}`).toBeLessThan(500)
      } else {
        expect(status, `${route} as ${role}`).toBe(403)
        expect(body, `${route} as ${role}`).toMatchObject({ code: 'not-allowed' })
      }
    }
  })

  it('under /api that does not exist is a problem document, not the page', async () => {
    const response = await as('lead').get('/api/nothing')
    expect(response.status).toBe(404)
    expect(response.body).toMatchObject({ code: 'no-such-route' })
  })
})
