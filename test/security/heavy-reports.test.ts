/** Reports that are made to fill the memory: `verify` refuses each in short time and little room. */
import { spawnSync } from 'node:child_process'
import { mkdtempSync, rmSync, truncateSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, describe, expect, it } from 'vitest'
import { buildWithFiles, utf8 } from '../app/pdf/reports'

const folder = mkdtempSync(join(tmpdir(), 'persquare-'))
afterAll(() => rmSync(folder, { recursive: true }))

const PROGRAM = join(import.meta.dirname, '..', '..', 'out', 'cli', 'persquare.js')
// Of this process alone; the usage that Node tells of counts the room of the process that started it.
const WATCH = `data:text/javascript,import{readFileSync}from"node:fs";process.on("exit",()=>console.error(readFileSync("/proc/self/status","utf8").match(/VmHWM.*/)[0]))`
const MB = 2 ** 20
const zeros = (megabytes: number): Uint8Array => new Uint8Array(megabytes * MB)

function verify(path: string) {
  const begin = performance.now()
  const ran = spawnSync(process.execPath, ['--import', WATCH, PROGRAM, 'verify', path], { encoding: 'utf8' })
  const room_MB = Number(/^VmHWM:\s+(\d+) kB$/m.exec(ran.stderr)?.[1]) / 1024
  return { ...ran, room_MB, took_ms: performance.now() - begin }
}

/** Beside what the program takes to say that there is no such file. */
function expectRefusal(path: string, most_MB: number): void {
  const idle = verify(join(folder, 'absent.pdf'))
  const { status, stdout, stderr, room_MB, took_ms } = verify(path)
  expect([status, stdout]).toEqual([2, ''])
  expect(stderr).not.toMatch(/\n\s+at |heap/)
  expect(idle.room_MB).toBeGreaterThan(20)
  expect(room_MB - idle.room_MB).toBeLessThan(most_MB)
  expect(took_ms).toBeLessThan(20_000)
}

describe.runIf(process.platform === 'linux')('verify', () => {
  it.each([
    ['an attachment of 200 MB of nothing', () => buildWithFiles([{ name: 'a.csv', content: zeros(200) }], 9)],
    ['one that says it is small', () => buildWithFiles([{ name: 'a.csv', content: zeros(200), size: 1000 }], 9)],
    ['one that says it is larger than anything', () => buildWithFiles([{ name: 'a.csv', content: utf8('1'), size: 2 ** 52 }])],
    ['a hundred that are a little too much each', () => buildWithFiles(Array.from({ length: 100 }, (_, n) => ({ name: `${n}.csv`, content: zeros(2) })), 9)],
  ])('refuses %s', (name, build) => {
    const path = join(folder, `${name}.pdf`)
    writeFileSync(path, build())
    expectRefusal(path, 50)
  }) // prettier-ignore

  it('takes many small ones apart, all of them together in bounded room', () => {
    const path = join(folder, 'many.pdf')
    const files = Array.from({ length: 200 }, (_, n) => ({ name: `${n}.csv`, content: zeros(1) }))
    writeFileSync(path, buildWithFiles(files, 9))
    expectRefusal(path, 300)
  })

  it('doesn’t read a file that is larger than any report', () => {
    const path = join(folder, 'large.pdf')
    writeFileSync(path, '%PDF-1.7\n')
    truncateSync(path, 3 * 2 ** 30)
    expectRefusal(path, 50)
  })
})
