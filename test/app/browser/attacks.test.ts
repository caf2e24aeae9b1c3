/** The loopback host under fire: a name pointed at it, guesses, floods and bodies that never end. */
import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { connect, type Socket } from 'node:net'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { startLoopbackHost, type LoopbackHost } from '../../../app/browser/loopback-host'
import { MAX_FILES_BYTES } from '../../../app/contract/host'
import { loopbackSettings } from './loopback-settings'

let folder: string
let host: LoopbackHost
let port: number
let secret: string
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'persquare-'))
  await writeFile(join(folder, 'index.html'), '<!doctype html>')
  host = await startLoopbackHost(loopbackSettings(folder, { root: folder }))
  port = Number(new URL(host.url).port)
  secret = new URL(host.url).pathname.split('/')[1]!
})
afterAll(async () => {
  await host.close()
  await rm(folder, { recursive: true })
})

const authority = () => `127.0.0.1:${port}`
const open = (): Promise<Socket> =>
  new Promise((resolve, reject) => {
    const socket = connect(port, '127.0.0.1', () => resolve(socket))
    socket.on('error', reject)
  })

/** What comes back for these bytes until the host closes, or has answered once. */
async function raw(text: string, patience_ms = 20_000): Promise<string> {
  const socket = await open()
  return new Promise((resolve) => {
    let answer = ''
    const done = () => {
      socket.destroy()
      resolve(answer)
    }
    socket.on('data', (part) => {
      answer += part.toString('latin1')
      if (answer.includes('\r\n\r\n')) done()
    })
    socket.on('close', done)
    socket.setTimeout(patience_ms, done)
    socket.write(text)
  })
}
const statusOf = (answer: string): number => Number(/^HTTP\/1\.1 (\d{3})/.exec(answer)?.[1] ?? 0)
const get = (path: string, headers: readonly string[]) =>
  raw(`GET ${path} HTTP/1.1\r\n${headers.map((line) => `${line}\r\n`).join('')}\r\n`)

describe('a name that was pointed at this computer', () => {
  it('gets nothing, whatever it calls itself, though it has the secret', async () => {
    const names = ['evil.example', `evil.example:${port}`, `127.0.0.1.evil.example:${port}`, `localhost:${port}`, `[::1]:${port}`, '127.0.0.1', `127.0.0.1:${port + 1}`, `0.0.0.0:${port}`, `2130706433:${port}`, `127.1:${port}`, `user@127.0.0.1:${port}`, ''] // prettier-ignore
    for (const name of names) expect(statusOf(await get(`/${secret}/`, [`Host: ${name}`])), name).toBe(403)
  })

  it('gets nothing with no name or two', async () => {
    for (const headers of [[], [`Host: ${authority()}`, 'Host: evil.example'], ['Host: evil.example', `Host: ${authority()}`]]) {
      expect([400, 403]).toContain(statusOf(await get(`/${secret}/`, headers)))
    }
  }) // prettier-ignore

  it('gets nothing by writing the whole address', async () => {
    for (const url of [`http://evil.example/${secret}/`, `http://${authority()}/${secret}/`, `//${authority()}/${secret}/`]) {
      expect([400, 403, 404]).toContain(statusOf(await get(url, [`Host: ${authority()}`])))
    }
  }) // prettier-ignore
})

it('no guess is nearer than another, and a thousand are answered as the first', async () => {
  const letters = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789-_'
  for (let guess = 0; guess < 1000; guess += 50) {
    const batch = Array.from({ length: 50 }, (_, at) => {
      const keep = (guess + at) % secret.length
      const other = letters[(letters.indexOf(secret[keep]!) + 1 + (at % 60)) % 64]
      return fetch(`http://${authority()}/${secret.slice(0, keep)}${other}${secret.slice(keep + 1)}/files/0`)
    })
    for (const response of await Promise.all(batch)) expect([response.status, await response.text()]).toEqual([404, ''])
  }
})

describe('bodies', () => {
  const post = (path: string, length: string, more: readonly string[] = []) =>
    [`POST /${secret}/${path} HTTP/1.1`, `Host: ${authority()}`, `Origin: http://${authority()}`, 'x-persquare: 1', `Content-Length: ${length}`, ...more, '', ''].join('\r\n') // prettier-ignore

  it('of lengths that are none, and of two lengths, are refused', async () => {
    for (const length of ['-1', '1e3', '0x10', '99999999999999999999', 'ten', '1, 1']) {
      expect([400, 411, 413], length).toContain(statusOf(await raw(post('kept', length))))
    }
    const both = [['Content-Length: 2'], ['Transfer-Encoding: chunked']]
    for (const more of both) expect([400, 411]).toContain(statusOf(await raw(post('kept', '1', more))))
  })

  it('that are too large are refused unread, and the line is closed', async () => {
    const answer = await raw(post('kept', String(MAX_FILES_BYTES + 1)))
    expect(statusOf(answer)).toBe(413)
    expect(answer).toMatch(/connection: close/i)
  })

  it('that stop half way hold up nobody else, and go when their sender goes', async () => {
    const slow = await Promise.all(Array.from({ length: 20 }, open))
    for (const socket of slow) socket.write(post('kept', '1000') + 'half')
    expect((await fetch(host.url)).status).toBe(200)
    for (const socket of slow) socket.destroy()
    expect((await fetch(`${host.url}state`)).status).toBe(200)
  })
})

describe('many at once', () => {
  it('that say nothing, or never end their headers, are given up, and the page is served all the while', async () => {
    const idle = await Promise.all(Array.from({ length: 150 }, open))
    const closed = idle.map((socket) => new Promise((resolve) => socket.on('close', resolve)))
    idle.forEach((socket, at) => {
      socket.on('error', () => undefined).resume()
      socket.write(at % 2 === 0 ? 'GET / HT' : `GET / HTTP/1.1\r\nHost: ${authority()}\r\nx: `)
    })
    const begin = performance.now()
    expect((await fetch(host.url)).status).toBe(200)
    expect(performance.now() - begin).toBeLessThan(2000)
    await Promise.all(closed)
    expect((await fetch(host.url)).status).toBe(200)
  })

  it('headers without end are cut', async () => {
    const answer = await raw(`GET /${secret}/ HTTP/1.1\r\nHost: ${authority()}\r\n${'x: y\r\n'.repeat(20_000)}`)
    expect([400, 431]).toContain(statusOf(answer))
  })

  it('words that are no request', async () => {
    for (const text of ['\0\0\0\0\r\n\r\n', 'HELLO\r\n\r\n', 'GET\r\n\r\n', '\x16\x03\x01\x02\x00\r\n\r\n', 'PRI * HTTP/2.0\r\n\r\nSM\r\n\r\n']) {
      expect([400, 403, 405]).toContain(statusOf(await raw(text)))
    }
    expect((await fetch(host.url)).status).toBe(200)
  }) // prettier-ignore
})
