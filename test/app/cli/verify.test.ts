import { readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { beforeAll, describe, expect, it } from 'vitest'
import { openPdf } from '../../../app/pdf/pdf-file'
import { readAttachments } from '../../../app/pdf/read-attachments'
import { renderPages, utf8 } from '../pdf/reports'
import { persquare, scratchFolder, type Ran } from './command'

const folder = scratchFolder()
const report = join(folder, 'report.pdf')
const result = join(folder, 'result.json')

const file = (name: string, content: Uint8Array | string): string => {
  const path = join(folder, name)
  writeFileSync(path, content)
  return path
}

/** The same files around another page, the result written anew. */
async function withResult(rewrite: (text: string) => string): Promise<Uint8Array> {
  const files = readAttachments(openPdf(readFileSync(report)))
  return renderPages(
    'x',
    files.map(({ name, bytes }) => ({
      name,
      bytes: name === 'result.json' ? utf8(rewrite(new TextDecoder().decode(bytes))) : bytes,
      mime: 'text/plain',
      description: name,
    })),
  )
}

function expectRefusal({ status, stdout, stderr }: Ran, message: RegExp): void {
  expect(stderr).toMatch(message)
  expect(stderr.trim().split('\n')).toHaveLength(1)
  expect(stderr).not.toMatch(/\n\s+at |internal error|undefined|NaN/)
  expect({ status, stdout }).toEqual({ status: 2, stdout: '' })
}

beforeAll(() => {
  const csv = file('TB-0421.csv', 'v_over_i_ohm\n20\n20.1\n20.2\n')
  const limits = { sheetResistanceOhmSq: { lower: 80, upper: 100 } }
  const procedure = file('procedure.json', JSON.stringify({ format: 'persquare-procedure/1', limits }))
  const { status, stderr } = persquare('analyze', csv, '--procedure', procedure, '--out', folder)
  expect({ status, stderr }).toEqual({ status: 0, stderr: '' })
})

describe('persquare verify', () => {
  it('says of a report just written that it is what comes out of its inputs', () => {
    const { status, stdout, stderr } = persquare('verify', report)
    expect({ status, stderr }).toEqual({ status: 0, stderr: '' })
    expect(stdout).toMatch(
      /^report\.pdf is what comes out of the inputs inside it: TB-0421\.csv, procedure\.json\.\nEvery digit .*\nEvery byte /,
    )
  })

  it('the result inside is the one that analyze wrote beside it', () => {
    const inside = readAttachments(openPdf(readFileSync(report))).find(({ name }) => name === 'result.json')!
    expect(Buffer.compare(inside.bytes, readFileSync(result))).toBe(0)
  })

  it('names a digit that was changed, in words and as JSON', async () => {
    const { mean } = JSON.parse(readFileSync(result, 'utf8')).wafers[0].statistics
    const changed = file('changed.pdf', await withResult((text) => text.replaceAll(`"mean": ${mean}`, `"mean": 90.5`)))
    const { status, stdout } = persquare('verify', changed)
    expect(status).toBe(1)
    expect(stdout).toMatch(/^changed\.pdf is not what comes out of the inputs inside it/)
    expect(stdout).toContain(`wafers[0].statistics.mean: 90.5 in the report, ${mean} comes out now\n`)
    expect(stdout).toContain('page 1: not as it comes out now\n')
    const json = persquare('verify', '--json', changed)
    expect(json.status).toBe(1)
    expect(JSON.parse(json.stdout)).toMatchObject({
      format: 'persquare-verification/1',
      report: 'changed.pdf',
      same: false,
      result: { differences: expect.arrayContaining([{ path: 'wafers[0].statistics.mean', report: 90.5, now: mean }]) as unknown },
      pages: { compared: 'bytes', differences: expect.arrayContaining(['page 1']) as unknown },
    })
  }) // prettier-ignore

  it('finds a byte changed in a page', () => {
    const bytes = readFileSync(report)
    // In the dictionary of a page: the file still reads well.
    const at = bytes.indexOf('/MediaBox [0 0 595')
    expect(at).toBeGreaterThan(0)
    bytes[at + '/MediaBox [0 0 '.length] = '6'.charCodeAt(0)
    const { status, stdout } = persquare('verify', file('page.pdf', bytes))
    expect(status).toBe(1)
    expect(stdout).toContain('Every digit of its result comes out the same.\npage 1: not as it comes out now\n')
  })

  it('lets no file write to the terminal', async () => {
    const name = '"name": "\\u001b[2J\\u009b2J\\u202e"'
    const { stdout } = persquare('verify', file('terminal.pdf', await withResult((text) => text.replace(/"name": "TB-0421"/, name)))) // prettier-ignore
    expect(stdout).toContain('lot.name')
    expect(stdout).not.toMatch(/[^\P{C}\n]/u)
  })

  it('refuses what is no report, shortly', async () => {
    const bytes = readFileSync(report)
    expectRefusal(persquare('verify', join(folder, 'nowhere.pdf')), /nowhere\.pdf.*no such file/)
    expectRefusal(persquare('verify', folder), /it is a folder/)
    expectRefusal(persquare('verify', result), /result\.json: .*it is no PDF file/)
    expectRefusal(persquare('verify', file('empty.pdf', '')), /empty\.pdf: .*it is no PDF file/)
    expectRefusal(persquare('verify', file('cut.pdf', bytes.subarray(0, 40_000))), /cut\.pdf: .*cut short/)
    expectRefusal(persquare('verify', file('other.pdf', await renderPages('x', []))), /other\.pdf: .*no files are attached/)
    const stray = { name: 'a.csv', bytes: utf8('1'), mime: 'text/csv', description: 'x' }
    expectRefusal(persquare('verify', file('stray.pdf', await renderPages('x', [stray]))), /no report of this program/)
  }) // prettier-ignore

  it('refuses arguments that make no sense', () => {
    expectRefusal(persquare('verify'), /REPORT\.pdf/)
    expectRefusal(persquare('verify', report, report), /one report/)
    expectRefusal(persquare('verify', report, '--colour'), /--colour/)
  })
})
