import type { ServerResponse } from 'node:http'
import type { Problem } from '../../core/problems/problem'
import { PAGE_HEADERS } from '../contract/page'

export function sendJson(response: ServerResponse, value: unknown, status = 200): void {
  send(response, status, 'application/json; charset=utf-8', Buffer.from(JSON.stringify(value)))
}

/** What was wrong, as data; 409 tells it from an answer. */
export function sendProblem(response: ServerResponse, problem: Problem): void {
  sendJson(response, problem, 409)
}

export function sendBytes(response: ServerResponse, bytes: Uint8Array): void {
  send(response, 200, 'application/octet-stream', bytes)
}

export function send(response: ServerResponse, status: number, contentType: string, body: Uint8Array): void {
  response.writeHead(status, {
    ...PAGE_HEADERS,
    'cache-control': 'no-store',
    'content-type': contentType,
    'content-length': body.length,
  })
  response.end(body)
}

export function end(response: ServerResponse, status: number): void {
  if (!response.headersSent) response.writeHead(status, { ...PAGE_HEADERS, 'cache-control': 'no-store' })
  response.end()
}
