/**
 * The same window in a browser of this computer: serves the built page, the named files, the state and reports on the
 * loopback address alone, under a path that nobody can guess.
 */
import { randomBytes } from 'node:crypto'
import { createServer } from 'node:http'
import type { IncomingMessage, Server, ServerResponse } from 'node:http'
import type { AddressInfo } from 'node:net'
import { StateStore } from '../host/state-store'
import type { Program } from '../host/make-report'
import { answerGet, answerPost, mostBytes, type Served } from './answers'
import { bodyOf } from './request-body'
import { refusalOf, sameText } from './request-checks'
import { end } from './responses'

export interface LoopbackSettings {
  /** 0: any that is free. */
  readonly port: number
  /** The folder of the built page. */
  readonly root: string
  /** The files that the program was started with; the page can read these, the bundled lot and no others. */
  readonly files: readonly string[]
  /** Of the bundled lot. */
  readonly demo: readonly string[]
  readonly stateFolder: string
  /** What made a report, for the report. */
  readonly program: Program
}

export interface LoopbackHost {
  readonly url: string
  close(): Promise<void>
}

const LOOPBACK = '127.0.0.1'

/** On one computer a request is there at once. One that trickles in, byte by byte, is given up all the same. */
const PATIENCE = { headersTimeout: 5000, requestTimeout: 60_000, connectionsCheckingInterval: 1000 } as const

/** @throws what the system says when the port can't be had */
export async function startLoopbackHost(settings: LoopbackSettings): Promise<LoopbackHost> {
  const { port, root, files, demo, program } = settings
  const secret = randomBytes(24).toString('base64url')
  const served: Served = { root, files, demo, program, state: new StateStore(settings.stateFolder) }
  const server = createServer(PATIENCE, (request, response) => {
    answer(request, response, secret, served, authorityOf(server)).catch(() => end(response, 500))
  })
  await listen(server, port)
  return { url: `http://${authorityOf(server)}/${secret}/`, close: () => close(server) }
}

async function answer(
  request: IncomingMessage,
  response: ServerResponse,
  secret: string,
  served: Served,
  authority: string,
): Promise<void> {
  // A body that nobody wants is not waited for.
  const refuse = (status: number): void => {
    if (request.method !== 'GET') response.setHeader('connection', 'close')
    end(response, status)
  }
  const status = refusalOf(request, authority)
  if (status !== null) return refuse(status)
  const [path = ''] = (request.url ?? '').split('?')
  const [, given = '', ...rest] = path.split('/')
  if (!sameText(given, secret) || rest.length === 0) return refuse(404)
  const inside = rest.join('/')
  if (request.method === 'GET') return answerGet(response, inside, served)
  const most = mostBytes(inside)
  if (most === null) return refuse(404)
  const body = await bodyOf(request, most)
  if (typeof body === 'number') return refuse(body)
  return answerPost(response, inside, body, served)
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
