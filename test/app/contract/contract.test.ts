import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import fc from 'fast-check'
import { describe, expect, it, vi } from 'vitest'
import { partBrought } from '../../../app/contract/brought-files'
import { CHANNELS, type HostCall } from '../../../app/contract/channels'
import { COMMAND_IDS, COMMANDS, isCommandId } from '../../../app/contract/commands'
import { isProcedureName, isReadingsName } from '../../../app/contract/file-kinds'
import { packParts, unpackParts } from '../../../app/contract/frame'
import type { Host } from '../../../app/contract/host'
import { ARGUMENTS, REPLIES } from '../../../app/contract/messages'
import { makeReport } from '../../../app/host/make-report'
import { checkedHost } from '../../../app/renderer/checked-host'

describe('a frame', () => {
  it('gives back what was packed', () => {
    fc.assert(
      fc.property(fc.array(fc.uint8Array({ maxLength: 40 }), { maxLength: 6 }), (parts) => {
        expect(unpackParts(packParts(parts))).toEqual(parts)
      }),
    )
  })

  it('is refused when a byte is missing or too many, and never read beyond its end', () => {
    fc.assert(
      fc.property(fc.array(fc.uint8Array({ maxLength: 20 }), { maxLength: 4 }), fc.nat(), (parts, at) => {
        const packed = packParts(parts)
        expect(unpackParts(packed.subarray(0, at % packed.length))).toBeNull()
        expect(unpackParts(new Uint8Array([...packed, 0]))).toBeNull()
      }),
    )
    fc.assert(
      fc.property(fc.uint8Array({ maxLength: 60 }), (noise) => {
        const parts = unpackParts(noise)
        if (parts) expect(packParts(parts)).toEqual(noise)
      }),
    )
  })
})

describe('the messages', () => {
  it('know every call, both ways', () => {
    const calls = Object.keys(CHANNELS).sort()
    expect(Object.keys(ARGUMENTS).sort()).toEqual(calls)
    expect(Object.keys(REPLIES).sort()).toEqual(calls)
    expect(new Set(Object.values(CHANNELS)).size).toBe(calls.length)
  })

  it('take a problem for one only when it can be told', () => {
    const told = (problem: unknown) => REPLIES.startFiles.safeParse({ ok: false, problem }).success
    expect(told({ kind: 'cannot-read', file: 'a.csv', why: 'no such file or folder' })).toBe(true)
    for (const wrong of [null, {}, { kind: 'toString' }, { kind: 'unheard-of' }, 'cannot-read', { kind: 'flagged-sites' }]) {
      expect(told(wrong)).toBe(false)
    }
  }) // prettier-ignore
})

describe('the host that the window sees', () => {
  const answering = (reply: unknown): Host =>
    ({ kind: 'browser', can: {}, ...Object.fromEntries(Object.keys(CHANNELS).map((name) => [name, () => Promise.resolve(reply)])) }) as unknown as Host // prettier-ignore

  it.each([undefined, null, {}, { ok: true }, { ok: 'yes' }, { ok: true, value: { path: '/' } }, { ok: false, problem: {} }])(
    'has a problem where the host answers %j',
    async (reply) => {
      const host = checkedHost(answering(reply))
      for (const name of Object.keys(CHANNELS) as HostCall[]) {
        const call = host[name] as () => Promise<unknown>
        expect(await call(), name).toMatchObject({ ok: false, problem: { kind: 'bad-argument', argument: name } })
      }
    },
  ) // prettier-ignore

  it('passes on what is as agreed, and nothing more', async () => {
    const files = [{ name: 'a.csv', bytes: new Uint8Array([1]), path: '/home/a.csv' }]
    expect(await checkedHost(answering({ ok: true, value: files })).startFiles()).toEqual({
      ok: true,
      value: [{ name: 'a.csv', bytes: new Uint8Array([1]) }],
    })
  })

  it('turns a call that fails into a problem', async () => {
    const host = checkedHost({ ...answering(null), loadState: () => Promise.reject(new Error('gone')) })
    expect(await host.loadState()).toMatchObject({ ok: false, problem: { why: 'Error: gone' } })
  })

  it('hears commands of the table alone', () => {
    let send: (command: never) => void = () => undefined
    const heard = vi.fn()
    const onCommand = (listener: (command: never) => void) => ((send = listener), () => undefined)
    checkedHost({ ...answering(null), onCommand } as unknown as Host).onCommand(heard)
    for (const command of ['undo', 'toString', '__proto__', 7, null]) send(command as never)
    expect(heard.mock.calls).toEqual([['undo']])
  })
})

describe('the commands', () => {
  it('have keys of their own', () => {
    const keys = COMMAND_IDS.flatMap((id) => COMMANDS[id].key ?? [])
    expect(new Set(keys).size).toBe(keys.length)
    expect(COMMAND_IDS.every(isCommandId)).toBe(true)
  })
})

it.each([
  ['TB-0417.csv', true, false],
  ['W2.TSV', true, false],
  ['.hidden.csv', false, false],
  ['.csv', false, false],
  ['notes.txt', false, false],
  ['p.procedure.JSON', false, true],
])('%s in a folder: readings %s, procedure %s', (name, readings, procedure) => {
  expect([isReadingsName(name), isProcedureName(name)]).toEqual([readings, procedure])
})

describe('files that a procedure names', () => {
  const utf8 = (value: object) => new TextEncoder().encode(JSON.stringify(value))
  const layer = { kind: 'doped-layer', dopant: 'boron', profile: 'tabulated', profileFile: 'profile.csv', background: { dopant: 'phosphorus', concentrationCm3: 1e15 } } // prettier-ignore
  const procedure = { name: 'p.json', bytes: utf8({ format: 'persquare-procedure/1', layer }) }
  const named = (name: string) => ({ name, bytes: new Uint8Array([1]) })

  it('go with it; all others are readings', () => {
    const brought = [named('profile.csv'), named('TB-0417.csv')]
    expect(partBrought(brought, procedure)).toEqual({ readings: [brought[1]], companions: [brought[0]] })
    expect(partBrought(brought, named('p.json'))).toEqual({ readings: brought, companions: [] })
  })

  it('are asked for by name when a report is made without them', async () => {
    const csv = new Uint8Array(readFileSync(join(import.meta.dirname, '..', '..', '..', 'sample-data', 'TB-0417.csv')))
    const request = { readings: [{ name: 'TB-0417.csv', bytes: csv }], procedure, excluded: [], decision: null, date: null, paper: 'A4' } as const // prettier-ignore
    await expect(makeReport(request, { program: 'Persquare', version: '9' })).rejects.toMatchObject({
      problem: { kind: 'missing-file', name: 'profile.csv' },
    })
  })
})
