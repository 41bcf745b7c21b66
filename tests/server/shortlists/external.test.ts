import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { checkRule, completions } from '../../../scoring/index.ts'
import type { ExternalTable } from '../../../shared/externalTables.ts'
import type { ShortlistDetail } from '../../../shared/shortlists.ts'
import { bundledEntries, loadEntries } from '../support/bundledSample.ts'
import { smallShortlist } from '../support/smallShortlist.ts'
import { openTestServer, type Agent, type TestServer } from '../support/testServer.ts'

const rule = 'score -volume\nreport h11\n'

let server: TestServer
let reviewer: Agent
let reader: Agent
let list: ShortlistDetail

const path = (rest = '') => `/api/campaigns/${server.campaignId}${rest}`
const upload = (body: object) => reviewer.post(path('/external-tables')).send({ name: 'mass.csv', ...body })
const store = async (body: object) => (await upload(body).expect(201)).body as ExternalTable
const read = async (agent = reader) =>
  (await agent.get(path(`/shortlists/${list.id}`)).expect(200)).body as ShortlistDetail
const keyAt = (place: number) => list.rows[place].candidateKey

beforeAll(async () => {
  server = await openTestServer({ jobs: { nullSize: () => 20 } })
  await loadEntries(
    server,
    bundledEntries('small', (id) => /^r2-00/.test(id)),
  )
  list = await smallShortlist(server, server.campaignId, server.accounts.lead, { rule, size: 6 })
  reviewer = await server.signIn('reviewer')
  reader = await server.signIn('reader')
})
afterAll(() => server.close())

describe('external columns', () => {
  const other = 'f'.repeat(32)
  let table: ExternalTable

  it('stand in the lists of the campaign, with who brought them', async () => {
    const text = `candidate,mass,note\n${keyAt(0)},1.5,=good\n${keyAt(2)},2,\n${other},3,elsewhere\n`
    table = await store({ text })
    expect(table).toMatchObject({ name: 'mass.csv', rows: 3, author: 'Reviewer', shortlistId: null })
    const { external, rows } = await read()
    expect(external).toMatchObject([
      { name: 'mass', type: 'number', tableId: table.id, tableName: 'mass.csv', author: 'Reviewer' },
      { name: 'note', type: 'text' },
    ])
    expect(rows.map((row) => row.external)).toEqual(
      rows.map((_, place) => (place === 0 ? [1.5, '=good'] : place === 2 ? [2, null] : [null, null])),
    )
  })

  it('stand in exports under a heading of their own', async () => {
    const csv = (await reader.get(path(`/shortlists/${list.id}/export.csv`)).expect(200)).text
    const lines = csv.split('\r\n')
    const heading = lines.findIndex((line) => !line.startsWith('#'))
    expect(lines[heading].split(',').slice(-2)).toEqual(['external: mass', 'external: note'])
    expect(lines[heading + 1].endsWith(",1.5,'=good")).toBe(true)
    expect(lines[heading + 2].endsWith(',,')).toBe(true)
    expect(lines.slice(0, heading).join('\n')).toMatch(/External columns: mass from mass\.csv \(Reviewer/)
    const { body } = await reader.get(path(`/shortlists/${list.id}/export.json`)).expect(200)
    expect(body.schema).toBe('tessellary.shortlist/2')
    expect(body.shortlist.external).toHaveLength(2)
  })

  it('cannot be read by a rule, nor change a score, a rank or an address', async () => {
    const check = checkRule('score mass\n')
    expect(check.ok).toBe(false)
    expect(check.issues[0].severity).toBe('error')
    const names = completions('score m', 7)?.options.map(({ label }) => label) ?? []
    expect(names.length).toBeGreaterThan(0)
    expect(names).not.toContain('mass')
    const refused = await (
      await server.signIn('lead')
    )
      .post(path('/targets'))
      .send({ name: 'By mass', text: 'score external.mass\n' })
    expect([refused.status, refused.body.code]).toEqual([422, 'rule-invalid'])
    const now = await read()
    expect(now.scoringHash).toBe(list.scoringHash)
    expect(now.rows.map(({ rank, candidateKey, outcome }) => [rank, candidateKey, outcome])).toEqual(
      list.rows.map(({ rank, candidateKey, outcome }) => [rank, candidateKey, outcome]),
    )
  })

  it('are replaced as a whole, and removed', async () => {
    const text = `candidate,mass\n${keyAt(1)},7\n`
    const replaced = await store({ text, name: 'again.csv', replaces: table.id })
    expect(replaced.id).toBe(table.id)
    const { external, rows } = await read()
    expect(external.map(({ name, tableName }) => [name, tableName])).toEqual([['mass', 'again.csv']])
    expect(rows.map((row) => row.external[0])).toEqual([null, 7, null, null, null, null])
    await reader.delete(path(`/external-tables/${table.id}`)).expect(403)
    await reviewer.delete(path(`/external-tables/${table.id}`)).expect(204)
    expect((await read()).external).toEqual([])
    await reviewer.delete(path(`/external-tables/${table.id}`)).expect(404)
  })

  it('belong to one list where that is asked for, and have names of their own', async () => {
    const own = await store({ text: `candidate,group\n${keyAt(0)},a\n`, shortlistId: list.id })
    const elsewhere = await smallShortlist(server, server.campaignId, server.accounts.lead, { rule, size: 4 })
    expect(elsewhere.external).toEqual([])
    expect((await read()).external.map(({ name }) => name)).toEqual(['group'])
    const twice = await upload({ text: `candidate,Group\n${keyAt(0)},b\n` })
    expect([twice.status, twice.body.code, twice.body.found]).toEqual([409, 'column-exists', 'Group'])
    await store({ text: `candidate,group\n${keyAt(0)},b\n`, shortlistId: elsewhere.id })
    const all = await reader.get(path('/external-tables')).expect(200)
    expect(all.body).toHaveLength(2)
    const shown = await reader.get(path(`/external-tables?shortlist=${list.id}`)).expect(200)
    expect(shown.body.map(({ id }: ExternalTable) => id)).toEqual([own.id])
  })

  it('are refused whole, with the places of all mistakes', async () => {
    const { status, body } = await upload({ text: `candidate,a\nnone,1\n${keyAt(0)}\n` })
    expect([status, body.code]).toEqual([422, 'table-invalid'])
    expect(body.places).toEqual([
      expect.objectContaining({ line: 2, column: 1, code: 'candidate-malformed' }),
      expect.objectContaining({ line: 3, column: 2, code: 'row-ragged' }),
    ])
    expect((await upload({ text: 'candidate,a\uFFFD\n' })).body.code).toBe('not-text')
    expect((await upload({ text: `candidate,z\n`, shortlistId: 'none' })).status).toBe(404)
    expect((await upload({ text: `candidate,z\n`, replaces: 'none' })).status).toBe(404)
  })
})
