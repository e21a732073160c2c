import { afterEach, describe, expect, test, vi } from 'vitest'
import { api } from '../../client/src/lib/api-client.ts'
import { ApiError } from '../../client/src/lib/errors.ts'

afterEach(() => vi.unstubAllGlobals())

function answer(status: number, body: unknown, type = 'application/json') {
  const fetch = vi.fn(() => Promise.resolve(new Response(body === undefined ? null : typeof body === 'string' ? body : JSON.stringify(body), { status, headers: { 'content-type': type } })))
  vi.stubGlobal('fetch', fetch)
  return fetch
}

describe('calls to the API', () => {
  test('reading sends no state-changing header and leaves out empty filters', async () => {
    const fetch = answer(200, { items: [] })
    await api.get('/constants', { query: { text: '1.6366', set: '', k: undefined } })
    expect(fetch).toHaveBeenCalledWith('/api/v1/constants?text=1.6366', expect.objectContaining({ method: 'GET', headers: { accept: 'application/json' } }))
  })
  test('every state-changing request carries the header against forged requests', async () => {
    const fetch = answer(204, undefined)
    await Promise.all([api.post('/runs', {}), api.put('/password', {}), api.patch('/group', {}), api.delete('/session'), api.upload('/claims/x/evidence', new FormData())])
    const headers = (fetch.mock.calls as unknown as [string, RequestInit][]).map(([, init]) => (init.headers as Record<string, string>)['X-Merestone'])
    expect(headers).toEqual(['1', '1', '1', '1', '1'])
  })
  test('a problem becomes an error with its code and fields', async () => {
    answer(400, { type: 'about:blank', title: 'Bad request', status: 400, code: 'invalid_input', detail: 'Some fields can’t be used.', fields: [{ path: 'definition.set.k', message: 'at least 1' }] }, 'application/problem+json')
    const error = await api.post('/plans').catch((thrown: unknown) => thrown)
    expect(error).toBeInstanceOf(ApiError)
    expect(error).toMatchObject({ status: 400, code: 'invalid_input', message: 'Some fields can’t be used.', fields: [{ path: 'definition.set.k', message: 'at least 1' }] })
  })
  test('an answer that is no problem, and no answer at all, are told apart', async () => {
    answer(502, '<html>', 'text/html')
    await expect(api.get('/desk')).rejects.toMatchObject({ status: 502, code: 'unexpected_answer' })
    vi.stubGlobal('fetch', () => Promise.reject(new TypeError('failed')))
    await expect(api.get('/desk')).rejects.toMatchObject({ status: 0, code: 'unreachable' })
  })
})
