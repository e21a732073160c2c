import request from 'supertest'
import { describe, expect, it } from 'vitest'
import { createApp } from '../../server/app.ts'

describe('the web application', () => {
  const app = createApp()

  it('says that it is up and reaches its database', async () => {
    await request(app).get('/health/live').expect(200, { status: 'up' })
    await request(app).get('/health/ready').expect(200, { status: 'ready' })
  })

  it('answers an unknown address of the API with a problem', async () => {
    const response = await request(app).get('/api/v1/nowhere').expect(404)
    expect(response.headers['content-type']).toMatch(/^application\/problem\+json/)
    expect(response.body).toMatchObject({ status: 404, code: 'not_found', requestId: response.headers['x-request-id'] })
  })

  it('answers malformed JSON with 400 and no word of its inside', async () => {
    const response = await request(app).post('/api/v1/session').set('X-Merestone', '1').set('Content-Type', 'application/json').send('{"email":').expect(400)
    expect(response.body.code).toBe('malformed_json')
    expect(response.text).not.toMatch(/SyntaxError|node_modules|at /)
  })

  it('refuses a change without the header that only our own pages send', async () => {
    const response = await request(app).post('/api/v1/session').send({}).expect(403)
    expect(response.body.code).toBe('cross_site_request')
  })
})
