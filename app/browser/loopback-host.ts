/**
 * The same window in a browser of this computer: serves the built page and the named files on the loopback address alone,
 * under a path that nobody can guess.
 */
import { randomBytes } from 'node:crypto'
import { readFile } from 'node:fs/promises'
import { createServer } from 'node:http'
import type { IncomingMessage, Server, ServerResponse } from 'node:http'
import type { AddressInfo } from 'node:net'
import { basename, join } from 'node:path'
import { systemReason } from '../../core/problems/system-reason'
import { NAMED_FILES_PATH } from '../contract/named-files'
import type { NamedFile } from '../contract/named-files'
import { PAGE_HEADERS, pageFile } from '../contract/page'
import { refusalOf, sameText } from './request-checks'

export interface LoopbackSettings {
  /** 0: any that is free. */
  readonly port: number
  /** The folder of the built page. */
  readonly root: string
  /** The files that the program was started with; the page can read these and no others. */
  readonly files: readonly string[]
}

export interface LoopbackHost {
  readonly url: string
  close(): Promise<void>
}

const LOOPBACK = '127.0.0.1'

/** @throws what the system says when the port can't be had */
export async function startLoopbackHost({ port, root, files }: LoopbackSettings): Promise<LoopbackHost> {
  const secret = randomBytes(24).toString('base64url')
  const server = createServer((request, response) => {
    answer(request, response, { secret, root, files, authority: authorityOf(server) }).catch(() => end(response, 500))
  })
  await listen(server, port)
  return { url: `http://${authorityOf(server)}/${secret}/`, close: () => close(server) }
}

interface Served {
  readonly secret: string
  readonly root: string
  readonly files: readonly string[]
  readonly authority: string
}

async function answer(request: IncomingMessage, response: ServerResponse, served: Served): Promise<void> {
  const status = refusalOf(request, served.authority)
  if (status !== null) return end(response, status)
  const [path = ''] = (request.url ?? '').split('?')
  const [, secret = '', ...rest] = path.split('/')
  if (!sameText(secret, served.secret) || rest.length === 0) return end(response, 404)
  const inside = rest.join('/')
  if (inside === NAMED_FILES_PATH) return sendJson(response, served.files.map(named))
  if (rest[0] === NAMED_FILES_PATH) return sendNamedFile(response, served.files, rest.slice(1).join('/'))
  return sendPageFile(response, served.root, inside)
}

function named(path: string): NamedFile {
  return { name: basename(path) }
}

async function sendPageFile(response: ServerResponse, root: string, path: string): Promise<void> {
  const file = pageFile(path)
  if (file === null) return end(response, 404)
  try {
    send(response, 200, file.contentType, await readFile(join(root, file.path)))
  } catch {
    end(response, 404)
  }
}

/** By its number in the list, so that no path ever comes from the page. */
async function sendNamedFile(response: ServerResponse, files: readonly string[], number: string): Promise<void> {
  const path = /^\d{1,4}$/.test(number) ? files[Number(number)] : undefined
  if (path === undefined) return end(response, 404)
  try {
    send(response, 200, 'application/octet-stream', await readFile(path))
  } catch (error) {
    sendJson(response, { kind: 'cannot-read', file: basename(path), why: systemReason(error) }, 409)
  }
}

function sendJson(response: ServerResponse, value: unknown, status = 200): void {
  send(response, status, 'application/json; charset=utf-8', Buffer.from(JSON.stringify(value)))
}

function send(response: ServerResponse, status: number, contentType: string, body: Buffer): void {
  response.writeHead(status, {
    ...PAGE_HEADERS,
    'cache-control': 'no-store',
    'content-type': contentType,
    'content-length': body.length,
  })
  response.end(body)
}

function end(response: ServerResponse, status: number): void {
  if (!response.headersSent) response.writeHead(status, { ...PAGE_HEADERS, 'cache-control': 'no-store' })
  response.end()
}

function authorityOf(server: Server): string {
  return `${LOOPBACK}:${(server.address() as AddressInfo).port}`
}

function listen(server: Server, port: number): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once('error', reject)
    server.listen({ host: LOOPBACK, port, exclusive: true }, () => {
      server.off('error', reject)
      resolve()
    })
  })
}

function close(server: Server): Promise<void> {
  return new Promise((resolve) => {
    server.close(() => resolve())
    server.closeAllConnections()
  })
}
