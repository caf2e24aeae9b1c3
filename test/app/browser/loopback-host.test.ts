import { mkdir, mkdtemp, rm, writeFile } from 'node:fs/promises'
import { request } from 'node:http'
import type { IncomingHttpHeaders } from 'node:http'
import { networkInterfaces, tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { startLoopbackHost } from '../../../app/browser/loopback-host'
import type { LoopbackHost } from '../../../app/browser/loopback-host'
import { CONTENT_SECURITY_POLICY } from '../../../app/contract/page'

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
  host = await startLoopbackHost({ port: 0, root: join(folder, 'page'), files })
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
}

/** Unlike fetch, lets a test say any Host and any path, dots included. */
function ask(
  path: string,
  headers: Record<string, string> = {},
  method = 'GET',
  address = '127.0.0.1',
): Promise<Answer> {
  return new Promise((resolve, reject) => {
    const sent = request({ host: address, port, path, method, headers: { host: `127.0.0.1:${port}`, ...headers } })
    sent.on('error', reject)
    sent.on('response', (response) => {
      let body = ''
      response.setEncoding('utf8').on('data', (part: string) => (body += part))
      response.on('end', () => resolve({ status: response.statusCode!, headers: response.headers, body }))
    })
    sent.end()
  })
}

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

  it.each(['POST', 'PUT', 'DELETE', 'OPTIONS'])('%s', async (method) => {
    expect((await ask(`/${secret}/`, {}, method)).status).toBe(405)
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
    await expect(startLoopbackHost({ port, root: folder, files: [] })).rejects.toMatchObject({ code: 'EADDRINUSE' })
  })
})

it('gives every start another secret, and its port back at the end', async () => {
  const second = await startLoopbackHost({ port: 0, root: folder, files: [] })
  expect(new URL(second.url).pathname).not.toBe(`/${secret}/`)
  await second.close()
  await expect(fetch(second.url)).rejects.toThrow()
})
