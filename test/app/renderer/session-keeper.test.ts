import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import type { Problem } from '../../../core/problems/problem'
import { sessionKeeper, type Keeping, type OpenSession } from '../../../app/renderer/persistence/session-keeper'

const bytes = (text: string): Uint8Array => new TextEncoder().encode(text)

/** A host that keeps everything in memory. */
function memoryHost() {
  const files = new Map<string, Uint8Array>()
  const states: { text: string; kept: readonly string[] }[] = []
  let refusal: Problem | null = null
  return {
    files,
    states,
    refuse: (problem: Problem | null) => (refusal = problem),
    keepFile: vi.fn((file: Uint8Array) => {
      const token = new TextDecoder().decode(file).length.toString().padStart(64, '0')
      files.set(token, file)
      return Promise.resolve({ ok: true, value: token } as const)
    }),
    keptFile: (token: string) => {
      const file = files.get(token)
      const problem = {
        kind: 'cannot-read',
        file: 'a file of the last session',
        why: 'no copy of it was kept',
      } as const
      return Promise.resolve(file ? ({ ok: true, value: file } as const) : ({ ok: false, problem } as const))
    },
    saveState: (text: string, kept: readonly string[]) => {
      if (refusal) return Promise.resolve({ ok: false, problem: refusal } as const)
      states.push({ text, kept })
      return Promise.resolve({ ok: true, value: 'saved' } as const)
    },
    loadState: () => {
      const last = states.at(-1)
      return Promise.resolve({
        ok: true,
        value: last ? { text: last.text, generation: 'last' as const } : null,
      } as const)
    },
  }
}

const session: OpenSession = {
  readings: [{ name: 'TB-0417.csv', bytes: bytes('wafer,site\n') }],
  procedure: { name: 'TB-0417.procedure.json', bytes: bytes('{}') },
  excluded: [{ wafer: '07', site: '12', reason: 'scratch' }],
  decision: { decision: 'hold', name: 'A. Tern', comment: '', date: null },
  view: { page: 'wafer' },
}

let host: ReturnType<typeof memoryHost>
let told: Keeping[]
beforeEach(() => {
  vi.useFakeTimers()
  host = memoryHost()
  told = []
})
afterEach(() => void vi.useRealTimers())
const keeper = () => sessionKeeper(host, (keeping) => told.push(keeping))

describe('the session keeper', () => {
  it('brings back what it kept', async () => {
    const first = keeper()
    first.keep(session)
    await first.flush()
    expect(await keeper().restore()).toEqual({ ok: true, value: { ...session, format: 'persquare-session/1', generation: 'last' } }) // prettier-ignore
  })

  it('keeps a moment after a change, once for many, and says how it stands', async () => {
    const one = keeper()
    for (const comment of ['p', 'pr', 'probe']) {
      one.keep({ ...session, decision: { ...session.decision, comment } })
      await vi.advanceTimersByTimeAsync(50)
    }
    expect(host.states).toEqual([])
    await vi.advanceTimersByTimeAsync(500)
    expect(host.states).toHaveLength(1)
    expect(host.states[0].text).toContain('"probe"')
    expect(told.at(0)).toBe('keeping')
    expect(told.at(-1)).toBe('kept')
  })

  it('goes on saving while a person goes on changing: no change waits for ever', async () => {
    const one = keeper()
    for (let k = 0; k < 40; k++) {
      one.keep(session)
      await vi.advanceTimersByTimeAsync(100)
    }
    expect(host.states.length).toBeGreaterThanOrEqual(8)
  })

  it('sends a file once, and names every file to the host', async () => {
    const one = keeper()
    for (const page of ['lot', 'wafer']) {
      one.keep({ ...session, view: { page } })
      await one.flush()
    }
    expect(host.keepFile).toHaveBeenCalledTimes(2)
    expect(host.states[1].kept).toEqual([...host.files.keys()])
  })

  it('tells what stands in the way, and recovers', async () => {
    const one = keeper()
    const full = { kind: 'bad-argument', argument: 'saveState', why: 'the disk is full' } as const
    host.refuse(full)
    one.keep(session)
    await one.flush()
    expect(told.at(-1)).toEqual({ problem: full })
    host.refuse(null)
    await vi.advanceTimersByTimeAsync(5000)
    expect(told.at(-1)).toBe('kept')
  })

  it('begins empty without a state, or with one of another edition', async () => {
    expect(await keeper().restore()).toEqual({ ok: true, value: null })
    for (const text of ['', '{}', '[1]', '{"format":"persquare-session/2"}', 'null']) {
      host.states.push({ text, kept: [] })
      expect(await keeper().restore()).toEqual({ ok: true, value: null })
    }
  })

  it('says which file is missing', async () => {
    const first = keeper()
    first.keep(session)
    await first.flush()
    host.files.clear()
    expect(await keeper().restore()).toMatchObject({ ok: false, problem: { kind: 'cannot-read', file: 'TB-0417.csv' } })
  })
})
