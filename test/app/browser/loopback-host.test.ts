import { mkdir, mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises'
import { request } from 'node:http'
import type { IncomingHttpHeaders } from 'node:http'
import { networkInterfaces, tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { startLoopbackHost } from '../../../app/browser/loopback-host'
import type { LoopbackHost } from '../../../app/browser/loopback-host'
import { packParts } from '../../../app/contract/frame'
import { MAX_FILES_BYTES, MAX_STATE_BYTES } from '../../../app/contract/host'
import { CONTENT_SECURITY_POLICY } from '../../../app/contract/page'
import { makeReport } from '../../../app/host/make-report'
import { loopbackSettings } from './loopback-settings'

let folder: string
let host: LoopbackHost
let port: number
let secret: string
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'persquare-'))
  await mkdir(join(folder, 'page'))
  await writeFile(join(folder, 'page', 'index.html'), '<!doctype html>')
  await writeFile(join(folder, 'TB-0417.csv'), 'wafer,site\n')
  await writeFile(join(folder, 'private.json'), '{}')
  const files = [join(folder, 'TB-0417.csv'), join(folder, 'gone.json')]
  host = await startLoopbackHost(loopbackSettings(folder, { root: join(folder, 'page'), files }))
  const url = new URL(host.url)
  port = Number(url.port)
  secret = url.pathname.split('/')[1]!
})
afterAll(async () => {
  await host.close()
  await rm(folder, { recursive: true })
})

interface Answer {
  readonly status: number
  readonly headers: IncomingHttpHeaders
  readonly body: string
  readonly bytes: Buffer
}

/** Unlike fetch, lets a test say any Host and any path, dots included. */
function ask(
  path: string,
  headers: Record<string, string> = {},
  method = 'GET',
  address = '127.0.0.1',
  sentBody?: Uint8Array,
): Promise<Answer> {
  return new Promise((resolve, reject) => {
    const sent = request({ host: address, port, path, method, headers: { host: `127.0.0.1:${port}`, ...headers } })
    sent.on('error', reject)
    sent.on('response', (response) => {
      const parts: Buffer[] = []
      response.on('data', (part: Buffer) => parts.push(part))
      response.on('end', () => {
        const bytes = Buffer.concat(parts)
        resolve({ status: response.statusCode!, headers: response.headers, body: bytes.toString('utf8'), bytes })
      })
    })
    sent.end(sentBody)
  })
}

/** As the page itself posts. */
const tell = (path: string, body: Uint8Array, headers: Record<string, string> = {}): Promise<Answer> =>
  ask(
    `/${secret}/${path}`,
    { origin: `http://127.0.0.1:${port}`, 'x-persquare': '1', 'content-length': String(body.length), ...headers },
    'POST',
    '127.0.0.1',
    body,
  )
const utf8 = (text: string): Uint8Array => new TextEncoder().encode(text)

describe('what it serves', () => {
  it('is at a loopback address with a long secret', () => {
    expect(host.url).toMatch(/^http:\/\/127\.0\.0\.1:\d+\/[\w-]{32}\/$/)
  })

  it('the page, under the security policy', async () => {
    for (const path of ['', 'index.html', '?x=1']) {
      const { status, headers, body } = await ask(`/${secret}/${path}`)
      expect([status, body]).toEqual([200, '<!doctype html>'])
      expect(headers).toMatchObject({
        'content-security-policy': CONTENT_SECURITY_POLICY,
        'content-type': 'text/html; charset=utf-8',
        'cache-control': 'no-store',
        'referrer-policy': 'no-referrer',
        'cross-origin-resource-policy': 'same-origin',
        'x-content-type-options': 'nosniff',
      })
    }
  })

  it('the names of the files of the command line, and each by its number', async () => {
    const list = await ask(`/${secret}/files`)
    expect(JSON.parse(list.body)).toEqual([{ name: 'TB-0417.csv' }, { name: 'gone.json' }])
    expect(await ask(`/${secret}/files/0`)).toMatchObject({ status: 200, body: 'wafer,site\n' })
  })

  it('the bundled lot', async () => {
    const list = await ask(`/${secret}/demo`)
    expect(JSON.parse(list.body)).toEqual([{ name: 'TB-0417.csv' }, { name: 'TB-0417.procedure.json' }])
    expect((await ask(`/${secret}/demo/0`)).body).toContain('Tern Bay')
  })

  it('the state that the page tells, and files beside it', async () => {
    const own = await startLoopbackHost(loopbackSettings(join(folder, 'own'), { root: folder }))
    const base = new URL(own.url)
    const post = (path: string, body: Uint8Array<ArrayBuffer>) =>
      fetch(`${own.url}${path}`, { method: 'POST', body, headers: { origin: base.origin, 'x-persquare': '1' } })
    const token = (await (await post('kept', new Uint8Array([1, 2, 3]))).json()) as string
    const text = '{"lot":"TB-0417 Ω"}'
    expect((await post('state', packParts([utf8(text), utf8(JSON.stringify([token]))]))).status).toBe(204)
    await own.close()
    const next = await startLoopbackHost(loopbackSettings(join(folder, 'own'), { root: folder }))
    expect(await (await fetch(`${next.url}state`)).json()).toEqual({ text, generation: 'last' })
    expect(new Uint8Array(await (await fetch(`${next.url}kept/${token}`)).arrayBuffer())).toEqual(
      new Uint8Array([1, 2, 3]),
    )
    await next.close()
    expect((await readdir(join(folder, 'own', 'state'))).sort()).toEqual(['kept', 'state'])
  })

  it('a report with the same bytes as made here, or the reason why there is none', async () => {
    const sample = async (name: string) =>
      new Uint8Array(await readFile(join(import.meta.dirname, '..', '..', '..', 'sample-data', name)))
    const csv = await sample('nist-wafer-map.csv')
    const procedure = await sample('nist-wafer-map.procedure.json')
    const terms = { excluded: [], decision: null, date: '2026-03-14', paper: 'Letter' } as const
    const head = { ...terms, readings: ['map.csv'], procedure: 'p.json' }
    const made = await tell('report', packParts([utf8(JSON.stringify(head)), procedure, csv]))
    expect(made).toMatchObject({ status: 200, headers: { 'content-type': 'application/pdf' } })
    const request = {
      ...terms,
      readings: [{ name: 'map.csv', bytes: csv }],
      procedure: { name: 'p.json', bytes: procedure },
    }
    const here = await makeReport(request, { program: 'Persquare', version: '9.8.7' })
    expect(Buffer.compare(made.bytes, here)).toBe(0)
    const none = await tell('report', packParts([utf8(JSON.stringify(head)), procedure, new Uint8Array()]))
    expect([none.status, JSON.parse(none.body)]).toEqual([409, { kind: 'empty-file', file: 'map.csv' }])
    for (const wrong of [
      { ...head, readings: [] },
      { ...head, paper: 'A3' },
      { ...head, decision: 'release' },
    ]) {
      expect((await tell('report', packParts([utf8(JSON.stringify(wrong)), procedure, csv]))).status).toBe(400)
    }
  })

  it('the reason why a file can’t be read', async () => {
    const { status, body } = await ask(`/${secret}/files/1`)
    expect(status).toBe(409)
    expect(JSON.parse(body)).toEqual({ kind: 'cannot-read', file: 'gone.json', why: 'no such file or folder' })
  })

  it('its own page’s requests', async () => {
    const own = { origin: `http://127.0.0.1:${port}`, 'sec-fetch-site': 'same-origin' }
    expect((await ask(`/${secret}/`, own)).status).toBe(200)
    expect((await ask(`/${secret}/`, { 'sec-fetch-site': 'none' })).status).toBe(200)
  })
})

describe('what it refuses', () => {
  it.each([
    ['a foreign name for this address', { host: 'evil.example' }],
    ['the address under another name', { host: 'localhost' }],
    ['the page of another site', { origin: 'https://evil.example' }],
    ['a page without an origin', { origin: 'null' }],
    ['a page of another port', { origin: 'http://127.0.0.1:1' }],
    ['a link from another site', { 'sec-fetch-site': 'cross-site' }],
    ['a link from another port', { 'sec-fetch-site': 'same-site' }],
  ])('%s', async (_, headers) => {
    expect(await ask(`/${secret}/`, headers)).toMatchObject({ status: 403, body: '' })
  })

  it.each(['PUT', 'DELETE', 'OPTIONS', 'HEAD'])('%s', async (method) => {
    expect((await ask(`/${secret}/`, {}, method)).status).toBe(405)
  })

  it.each([
    ['without an origin', { origin: undefined }],
    ['from another origin', { origin: 'https://evil.example' }],
    ['without our own header', { 'x-persquare': undefined }],
    ['as a form would be', { 'x-persquare': undefined, 'content-type': 'text/plain' }],
    ['from another site', { 'sec-fetch-site': 'cross-site' }],
    ['under a foreign name', { host: 'evil.example' }],
  ])('a POST %s', async (_, changed) => {
    const all = { origin: `http://127.0.0.1:${port}`, 'x-persquare': '1', ...changed }
    const headers = Object.fromEntries(Object.entries(all).filter(([, value]) => value !== undefined)) as Record<string, string> // prettier-ignore
    for (const path of ['state', 'kept', 'report', 'files/taken']) {
      expect(await ask(`/${secret}/${path}`, headers, 'POST'), path).toMatchObject({ status: 403, body: '' })
    }
  })

  it('a POST to anything that takes none, and without the secret', async () => {
    for (const path of ['', 'index.html', 'files', 'files/0', 'demo', 'demo/0', 'kept/x', 'state/x', 'toString', '../state']) {
      expect((await tell(path, new Uint8Array())).status, path).toBe(404)
    }
    const wrong = { origin: `http://127.0.0.1:${port}`, 'x-persquare': '1', 'content-length': '0' }
    for (const path of ['/state', '/x/state', '//state']) expect((await ask(path, wrong, 'POST')).status).toBe(404)
  }) // prettier-ignore

  it('a body that is too large, before it is sent, or of no known length', async () => {
    const room = 4 * 2 ** 20
    for (const [path, most] of [
      ['state', MAX_STATE_BYTES + room],
      ['kept', MAX_FILES_BYTES],
      ['report', MAX_FILES_BYTES + room],
      ['files/taken', 0],
    ] as const) {
      expect(await tell(path, new Uint8Array(), { 'content-length': String(most + 1) }), path).toMatchObject({
        status: 413,
        headers: { connection: 'close' },
      })
    }
    const chunked = { origin: `http://127.0.0.1:${port}`, 'x-persquare': '1', 'transfer-encoding': 'chunked' }
    expect((await ask(`/${secret}/state`, chunked, 'POST')).status).toBe(411)
  })

  it('frames and words that no page of ours sends', async () => {
    const frames = [
      new Uint8Array(),
      new Uint8Array([1, 0, 0, 0]),
      new Uint8Array([255, 255, 255, 255, 0]),
      utf8('{"text":"x"}'),
      packParts([]),
      packParts([utf8('{}')]),
      packParts([utf8('{}'), utf8('{}')]),
      packParts([utf8('{}'), utf8('["../../etc/hosts", 7]')]),
      packParts([new Uint8Array([0xff, 0xfe]), utf8('[]')]),
      new Uint8Array([...packParts([utf8('{}'), utf8('[]')]), 0]),
    ]
    for (const frame of frames) {
      expect((await tell('state', frame)).status).toBe(400)
      expect((await tell('report', frame)).status).toBe(400)
    }
    // Larger than a state, though no larger than its frame may be.
    const large = packParts([new Uint8Array(MAX_STATE_BYTES + 1).fill(97), utf8('[]')])
    expect(await tell('state', large)).toMatchObject({ status: 409 })
    expect(JSON.parse((await ask(`/${secret}/state`)).body)).toBeNull()
  })

  it('tokens of nothing that was kept', async () => {
    for (const token of ['0'.repeat(64), 'state', '..%2fstate', '../state', '']) {
      const { status, body } = await ask(`/${secret}/kept/${token}`)
      expect([status, (JSON.parse(body) as { kind: string }).kind]).toEqual([409, 'cannot-read'])
    }
  })

  it('every path without the secret', async () => {
    const near = `${secret.slice(0, -1)}${secret.endsWith('A') ? 'B' : 'A'}`
    for (const path of ['/', '/index.html', '/files', `/${near}/`, `/${near}/files/0`, `/${secret}`, '//', '*']) {
      expect(await ask(path), path).toMatchObject({ status: 404, body: '' })
    }
  })

  it.each([
    '../private.json',
    '%2e%2e/private.json',
    '..%2fprivate.json',
    './index.html',
    'files/2',
    'files/-1',
    'files/00000',
    'files/../private.json',
    'files/0/0',
    'files/',
    'absent.js',
    'index.html%00.js',
  ])('%s', async (path) => {
    expect(await ask(`/${secret}/${path}`)).toMatchObject({ status: 404, body: '' })
  })

  it('any other address of this computer', async () => {
    const others = Object.values(networkInterfaces()).flatMap((entries) =>
      (entries ?? []).filter(({ family, internal }) => family === 'IPv4' && !internal).map(({ address }) => address),
    )
    for (const address of ['127.0.0.2', ...others]) {
      await expect(ask(`/${secret}/`, {}, 'GET', address), address).rejects.toThrow(/ECONNREFUSED|EADDRNOTAVAIL/)
    }
  })

  it('a port that is taken', async () => {
    await expect(startLoopbackHost({ ...loopbackSettings(folder, { root: folder }), port })).rejects.toMatchObject({
      code: 'EADDRINUSE',
    })
  })
})

it('gives every start another secret, and its port back at the end', async () => {
  const second = await startLoopbackHost(loopbackSettings(folder, { root: folder }))
  expect(new URL(second.url).pathname).not.toBe(`/${secret}/`)
  await second.close()
  await expect(fetch(second.url)).rejects.toThrow()
})

it('hands the files of the command line out once', async () => {
  const files = [join(folder, 'TB-0417.csv')]
  const own = await startLoopbackHost(loopbackSettings(folder, { root: folder, files }))
  const headers = { origin: new URL(own.url).origin, 'x-persquare': '1' }
  expect(await (await fetch(`${own.url}files`)).json()).toEqual([{ name: 'TB-0417.csv' }])
  expect((await fetch(`${own.url}files/taken`, { method: 'POST', headers })).status).toBe(204)
  expect(await (await fetch(`${own.url}files`)).json()).toEqual([])
  await own.close()
})
