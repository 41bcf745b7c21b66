// @vitest-environment happy-dom
import { afterEach, describe, expect, it, vi } from 'vitest'
import { z } from 'zod'
import { ApiError, apiUrl, ConnectionError, ContractError, request } from '../../src/api/request.ts'
import { problem, Status, stubApi } from './stubApi.ts'

afterEach(() => vi.unstubAllGlobals())
const schema = z.object({ n: z.number() })

describe('request', () => {
  it('gives the parsed answer', async () => {
    stubApi({ 'GET /thing': { n: 3 } })
    expect(await request('/thing', { schema })).toEqual({ n: 3 })
  })

  it('turns a problem document into an error with its code', async () => {
    stubApi({ 'POST /thing': new Status(422, problem(422, 'not-integers', 'Line 2: 1.5 is no integer.')) })
    const error = await request('/thing', { method: 'POST', body: {}, schema }).catch(
      (reason: unknown) => reason,
    )
    expect(error).toBeInstanceOf(ApiError)
    expect(error).toMatchObject({ status: 422, code: 'not-integers', message: 'Line 2: 1.5 is no integer.' })
  })

  it('gives a failure without a problem document the same shape', async () => {
    vi.stubGlobal('fetch', () => Promise.resolve(new Response('<html>', { status: 502 })))
    await expect(request('/thing', { schema })).rejects.toMatchObject({
      status: 502,
      code: 'UNEXPECTED_ANSWER',
    })
  })

  it('says which part of an answer breaks the contract', async () => {
    stubApi({ 'GET /thing': { n: 'three' } })
    const error = await request('/thing', { schema }).catch((reason: unknown) => reason)
    expect(error).toBeInstanceOf(ContractError)
    expect(String(error)).toContain('n:')
  })

  it('tells a lost connection from a refusal', async () => {
    vi.stubGlobal('fetch', () => Promise.reject(new TypeError('failed')))
    await expect(request('/thing', { schema })).rejects.toBeInstanceOf(ConnectionError)
  })

  it('leaves empty query values out', () => {
    expect(apiUrl('/polytopes', { h11Min: 3, text: '', campaign: undefined })).toBe('/api/polytopes?h11Min=3')
  })
})
