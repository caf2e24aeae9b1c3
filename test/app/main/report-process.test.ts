import { readFile } from 'node:fs/promises'
import { mkdtemp, readdir, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Reply, ReportRequest } from '../../../app/contract/host'
import { makeReport } from '../../../app/host/make-report'
import { answerJob, makeReportBeside, type Maker, type ReportJob } from '../../../app/main/report-process'
import { openInViewer, removeViewed } from '../../../app/main/viewer'

const sample = (name: string) => readFile(join(import.meta.dirname, '..', '..', '..', 'sample-data', name))
const program = { program: 'Persquare', version: '9.8.7' }
let request: ReportRequest
beforeAll(async () => {
  request = {
    readings: [{ name: 'nist-wafer-map.csv', bytes: new Uint8Array(await sample('nist-wafer-map.csv')) }],
    procedure: { name: 'p.json', bytes: new Uint8Array(await sample('nist-wafer-map.procedure.json')) },
    excluded: [],
    decision: { decision: 'hold', name: 'A. Tern', comment: '', date: '2026-03-14T10:00:00Z' },
    date: '2026-03-14',
    paper: 'A4',
  }
})

/** Does in this process what the maker does in its own, or dies. */
function maker(death?: 'at once' | 'later'): Maker & { killed: number } {
  const listeners: Record<string, (value: never) => void> = {}
  return {
    killed: 0,
    on: (event: string, listener: never) => (listeners[event] = listener),
    postMessage(job: ReportJob) {
      if (death === 'later') setTimeout(() => (listeners['exit'] as (code: number) => void)(134), 5)
      else void answerJob(job).then((reply) => (listeners['message'] as (reply: Reply<Uint8Array>) => void)(reply))
    },
    kill() {
      this.killed++
      return true
    },
  }
}

describe('a report made beside', () => {
  it('is the same as one made here, and its process ends', async () => {
    const beside = maker()
    const pdf = await makeReportBeside({ request, program }, () => beside)
    expect(Buffer.compare(pdf, await makeReport(request, program))).toBe(0)
    expect(beside.killed).toBe(1)
  })

  it('is made here where no process can be started, or it dies', async () => {
    const dead = () => {
      throw new Error('no memory')
    }
    for (const start of [dead, () => maker('later')]) {
      const pdf = await makeReportBeside({ request, program }, start)
      expect(Buffer.from(pdf.subarray(0, 5)).toString()).toBe('%PDF-')
    }
  })

  it('that can’t be made says why, once', async () => {
    const wrong = { ...request, readings: [{ name: 'empty.csv', bytes: new Uint8Array() }] }
    await expect(makeReportBeside({ request: wrong, program }, () => maker())).rejects.toMatchObject({
      problem: { kind: 'empty-file', file: 'empty.csv' },
    })
  })
})

describe('the viewer', () => {
  let folder: string
  beforeAll(async () => (folder = await mkdtemp(join(tmpdir(), 'persquare-'))))
  afterAll(() => rm(folder, { recursive: true }))
  const pdf = new TextEncoder().encode('%PDF-1.7\n')

  it('is given the report in a folder of its own, which goes at the end', async () => {
    const opened: string[] = []
    await openInViewer(pdf, { folder, open: (path) => Promise.resolve((opened.push(path), '')) })
    expect(opened).toHaveLength(1)
    expect(new Uint8Array(await readFile(opened[0]!))).toEqual(pdf)
    await removeViewed()
    expect(await readdir(folder)).toEqual([])
  })

  it('is given nothing but a PDF, and may be missing', async () => {
    const open = () => Promise.resolve('No application is registered')
    await expect(openInViewer(new TextEncoder().encode('#!/bin/sh'), { folder, open })).rejects.toMatchObject({
      problem: { kind: 'bad-argument' },
    })
    await expect(openInViewer(pdf, { folder, open })).rejects.toMatchObject({
      problem: { kind: 'not-applicable', what: 'printing' },
    })
    await removeViewed()
  })
})
