/** What the page of the loopback host may ask for, by method and the first word of the path after the secret. */
import { readFile } from 'node:fs/promises'
import type { ServerResponse } from 'node:http'
import { basename, join } from 'node:path'
import { unpackParts } from '../contract/frame'
import { MAX_FILES_BYTES, MAX_STATE_BYTES, type ReportRequest, type Reply } from '../contract/host'
import { COUNT_HEADER, LOOPBACK_PATHS, type NamedFile } from '../contract/loopback'
import { ARGUMENTS, reportHead } from '../contract/messages'
import { pageFile } from '../contract/page'
import { makeReport, type Program } from '../host/make-report'
import { openFiles } from '../host/open-files'
import { replying } from '../host/replies'
import type { StateStore } from '../host/state-store'
import { end, send, sendBytes, sendJson, sendProblem } from './responses'

export interface Served {
  /** The folder of the built page. */
  readonly root: string
  /** Files that wait to be fetched by the page. */
  files: readonly string[]
  readonly demo: readonly string[]
  readonly state: StateStore
  readonly program: Program
}

/** Room for a frame's lengths and for what is asked for, beside the files. */
const FRAME_ROOM = 2 ** 20 * 4

/** How large the body of a POST may be; null where nothing may be posted to. */
export function mostBytes(path: string): number | null {
  const most: Readonly<Record<string, number>> = {
    [LOOPBACK_PATHS.taken]: 0,
    [LOOPBACK_PATHS.state]: MAX_STATE_BYTES + FRAME_ROOM,
    [LOOPBACK_PATHS.kept]: MAX_FILES_BYTES,
    [LOOPBACK_PATHS.report]: MAX_FILES_BYTES + FRAME_ROOM,
  }
  return Object.hasOwn(most, path) ? most[path] : null
}

export async function answerGet(response: ServerResponse, path: string, served: Served): Promise<void> {
  const [first, ...rest] = path.split('/')
  const below = rest.join('/')
  if (first === LOOPBACK_PATHS.files) return sendFile(response, served.files, rest.length > 0 ? below : null)
  if (first === LOOPBACK_PATHS.demo) return sendFile(response, served.demo, rest.length > 0 ? below : null)
  if (path === LOOPBACK_PATHS.state) {
    return reply(response, await replying('loadState', () => served.state.loadCounted()), (to, { state, count }) => {
      to.setHeader(COUNT_HEADER, count)
      sendJson(to, state)
    })
  }
  if (first === LOOPBACK_PATHS.kept && rest.length > 0) {
    return reply(response, await replying('keptFile', () => served.state.files.read(below)), sendBytes)
  }
  return sendPageFile(response, served.root, path)
}

export async function answerPost(
  response: ServerResponse,
  path: string,
  body: Uint8Array,
  served: Served,
): Promise<void> {
  if (path === LOOPBACK_PATHS.taken) {
    served.files = []
    return end(response, 204)
  }
  if (path === LOOPBACK_PATHS.kept) {
    return reply(response, await replying('keepFile', () => served.state.files.keep(body)), sendJson)
  }
  if (path === LOOPBACK_PATHS.state) return saveState(response, body, served.state)
  const request = reportRequest(body)
  if (!request) return end(response, 400)
  const made = await replying('makeReport', () => makeReport(request, served.program))
  return reply(response, made, (to, pdf) => send(to, 200, 'application/pdf', pdf))
}

async function saveState(response: ServerResponse, body: Uint8Array, state: StateStore): Promise<void> {
  const [text, kept, count] = unpackParts(body) ?? []
  const args = kept && ARGUMENTS.saveState.safeParse([textOf(text), jsonOf(kept)])
  const basis = count && jsonOf(count)
  if (!args?.success || !(basis === undefined || Number.isSafeInteger(basis))) return end(response, 400)
  const [written, tokens] = args.data
  const saved = await replying('saveState', () => state.save(written, tokens, basis as number | undefined))
  return reply(response, saved, (to, now) => {
    to.setHeader(COUNT_HEADER, now)
    end(to, 204)
  })
}

/** null where the frame is not what the page sends. */
function reportRequest(body: Uint8Array): ReportRequest | null {
  const [first, procedureBytes, ...bytes] = unpackParts(body) ?? []
  const head = procedureBytes && reportHead.safeParse(jsonOf(first))
  if (!head?.success || head.data.readings.length !== bytes.length) return null
  const { readings, procedure, ...terms } = head.data
  return {
    ...terms,
    readings: readings.map((name, k) => ({ name, bytes: bytes[k] })),
    procedure: { name: procedure, bytes: procedureBytes },
  }
}

function textOf(bytes: Uint8Array): string | null {
  try {
    return new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(bytes)
  } catch {
    return null
  }
}

function jsonOf(bytes: Uint8Array): unknown {
  try {
    return JSON.parse(textOf(bytes) ?? '')
  } catch {
    return null
  }
}

function reply<Value>(
  response: ServerResponse,
  answer: Reply<Value>,
  sendValue: (response: ServerResponse, value: Value) => void,
): void {
  if (answer.ok) sendValue(response, answer.value)
  else sendProblem(response, answer.problem)
}

/** By its number in the list, so that no path ever comes from the page; null lists the names. */
async function sendFile(response: ServerResponse, paths: readonly string[], number: string | null): Promise<void> {
  if (number === null)
    return sendJson(
      response,
      paths.map((path): NamedFile => ({ name: basename(path) })),
    )
  const path = /^(0|[1-9]\d{0,3})$/.test(number) ? paths[Number(number)] : undefined
  if (path === undefined) return end(response, 404)
  const opened = await replying('startFiles', () => openFiles([path]))
  return reply(response, opened, (to, [file]) => sendBytes(to, file.bytes))
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
