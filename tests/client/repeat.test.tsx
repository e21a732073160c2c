import { act, render, screen, within } from '@testing-library/react'
import { userEvent } from '@testing-library/user-event'
import { generateKeyPairSync, sign } from 'node:crypto'
import { MemoryRouter } from 'react-router-dom'
import { beforeAll, describe, expect, test, vi } from 'vitest'
import { CertificateChecks } from '../../client/src/features/repeat/components/certificate-checks.tsx'
import { RepetitionPanel } from '../../client/src/features/repeat/components/repetition.tsx'
import { ENGINE_RELEASE } from '../../client/src/features/repeat/engine-release.ts'
import type { RepeatAnswer, RepeatRequest } from '../../client/src/features/repeat/messages.ts'
import { checkDigest, checkSignature } from '../../client/src/features/repeat/signature-check.ts'
import { VerifyView } from '../../client/src/pages/verify/verify-view.tsx'
import { readEngineRelease } from '../../server/engine-release.ts'
import { makeCertificate } from '../../shared/engine/certificate/certificate.ts'
import type { Certificate } from '../../shared/engine/certificate/certificate.ts'
import { repeatCertificate } from '../../shared/engine/certificate/repeat.ts'
import { computeAll, prepare } from '../../shared/engine/engine.ts'
import type { PublicKey } from '../../shared/schemas/group.ts'

let certificate: Certificate

beforeAll(async () => {
  const computation = await prepare({ definitions: [{ type: 'series', set: { kind: 'primes', exclude: [] }, weight: { power: '1', logPower: '1' } }], method: 'transform', arithmetic: 'ball', goal: { digits: 5 } })
  const [outcome] = await computeAll(computation)
  certificate = await makeCertificate(outcome!, ENGINE_RELEASE)
})

/** A worker that is played by the test. */
class PlayedWorker {
  onmessage: ((event: MessageEvent<RepeatAnswer>) => void) | null = null
  onerror: ((event: ErrorEvent) => void) | null = null
  sent: RepeatRequest[] = []
  terminate = vi.fn()
  postMessage(request: RepeatRequest): void {
    this.sent.push(request)
  }
  say(data: RepeatAnswer): void {
    act(() => this.onmessage?.({ data } as MessageEvent<RepeatAnswer>))
  }
}

function showPanel(of: Certificate) {
  const worker = new PlayedWorker()
  const view = render(<RepetitionPanel certificate={of} startWorker={() => worker as unknown as Worker} />)
  return { worker, ...view }
}
const begin = () => userEvent.click(screen.getByRole('button', { name: 'Repeat it in this browser' }))

describe('repeating', () => {
  test('shows how far it is and says that it repeats', async () => {
    const { worker } = showPanel(certificate)
    await begin()
    expect(worker.sent).toEqual([{ certificate }])
    worker.say({ kind: 'progress', share: 0.423 })
    expect(screen.getByRole('progressbar')).toHaveAttribute('aria-valuenow', '42')
    worker.say({ kind: 'done', repetition: await repeatCertificate(certificate) })
    expect(screen.getByRole('status')).toHaveTextContent('It repeats.')
    expect(worker.terminate).toHaveBeenCalled()
  })
  test('a digit changed in the file is told apart', async () => {
    const changed = { ...certificate, enclosure: { ...certificate.enclosure, hi: certificate.enclosure.hi.replace(/.$/, (digit) => String((Number(digit) + 1) % 10)) } }
    const { worker } = showPanel(changed)
    await begin()
    worker.say({ kind: 'done', repetition: await repeatCertificate(changed) })
    expect(screen.getByRole('alert')).toHaveTextContent('It does not repeat.')
    expect(screen.getByRole('alert')).toHaveTextContent('The enclosure is stated as')
  })
  test('a remark added to the file is told from a wrong enclosure', async () => {
    const changed = { ...certificate, engine: { ...certificate.engine, version: '9.9.9' } }
    const { worker } = showPanel(changed)
    await begin()
    worker.say({ kind: 'done', repetition: await repeatCertificate(changed) })
    expect(screen.getByRole('alert')).toHaveTextContent('The enclosure repeats, but the file was changed.')
  })
  test('can be stopped, and ends with the page', async () => {
    const { worker, unmount } = showPanel(certificate)
    await begin()
    await userEvent.click(screen.getByRole('button', { name: 'Stop' }))
    expect(worker.terminate).toHaveBeenCalledOnce()
    expect(screen.getByRole('status')).toHaveTextContent('Stopped.')
    await userEvent.click(screen.getByRole('button', { name: 'Repeat it once more' }))
    unmount()
    expect(worker.terminate).toHaveBeenCalledTimes(2)
  })
  test('a program that breaks off says nothing about the certificate', async () => {
    const { worker } = showPanel(certificate)
    await begin()
    worker.say({ kind: 'failed', message: 'Out of memory.' })
    expect(screen.getByRole('alert')).toHaveTextContent('The repetition broke off. Out of memory. That says nothing about the certificate.')
  })
})

test('the page knows which engine runs in it: the one in the sources', () => {
  expect(ENGINE_RELEASE).toEqual(readEngineRelease())
})

describe('digest and signature', () => {
  const pair = generateKeyPairSync('ed25519')
  const key = (id: string, pem = pair.publicKey.export({ type: 'spki', format: 'pem' })): PublicKey => ({ id, algorithm: 'Ed25519', pem: String(pem), createdAt: '2026-03-01T08:00:00Z', retiredAt: null })
  const signed = (): Certificate => ({ ...certificate, signature: { algorithm: 'Ed25519', keyId: 'one', value: sign(null, Buffer.from(certificate.digest, 'utf8'), pair.privateKey).toString('base64') } })

  test('the digest holds for the content it was made of, and for nothing else', async () => {
    expect(await checkDigest(certificate)).toBe(true)
    expect(await checkDigest({ ...certificate, radius: '1.0e-1' })).toBe(false)
  })
  test('a signature by a key of the register is valid', async () => {
    expect(await checkSignature(signed(), [key('other'), key('one')])).toMatchObject({ status: 'valid', key: { id: 'one' } })
  })
  test('one by another key, over another digest, or with an unknown key is not', async () => {
    const other = generateKeyPairSync('ed25519').publicKey.export({ type: 'spki', format: 'pem' })
    expect(await checkSignature(signed(), [key('one', other)])).toEqual({ status: 'invalid', keyId: 'one' })
    expect(await checkSignature({ ...signed(), digest: 'ab'.repeat(32) }, [key('one')])).toEqual({ status: 'invalid', keyId: 'one' })
    expect(await checkSignature(signed(), [key('two')])).toEqual({ status: 'unknown-key', keyId: 'one' })
    expect(await checkSignature(certificate, [key('one')])).toEqual({ status: 'unsigned' })
  })
  test('a browser that can’t read the key does not call the signature wrong', async () => {
    expect(await checkSignature(signed(), [key('one', '-----BEGIN PUBLIC KEY-----\nAAAA\n-----END PUBLIC KEY-----')])).toEqual({ status: 'unable', keyId: 'one' })
  })
  test('each check is told by a word', () => {
    render(<MemoryRouter><CertificateChecks certificate={certificate} intact={false} signature={{ status: 'valid', key: key('one') }} keysError={null} /></MemoryRouter>)
    const list = screen.getAllByRole('definition').map((definition) => definition.textContent)
    expect(list[0]).toBe('fails')
    expect(list[2]).toBe('holds')
    expect(list[4]).toBe('the same')
  })
})

describe('the page', () => {
  test('says in one line why a file is no certificate', () => {
    render(<MemoryRouter><VerifyView dropped={{ name: 'notes.json', problem: 'The file is not JSON.' }} onFile={() => undefined} /></MemoryRouter>)
    expect(screen.getByRole('alert')).toHaveTextContent('notes.json can’t be read as a certificate. The file is not JSON.')
  })
  test('takes a file by choosing it', async () => {
    const take = vi.fn()
    render(<MemoryRouter><VerifyView dropped={null} onFile={take} /></MemoryRouter>)
    const file = new File(['{}'], 'certificate.json', { type: 'application/json' })
    await userEvent.upload(within(screen.getByRole('main')).getByLabelText('The certificate'), file)
    expect(take).toHaveBeenCalledWith(file)
  })
})
