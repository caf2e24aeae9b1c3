import { spawn } from 'node:child_process'
import { chmod, mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { browserCommand } from '../../../app/cli/open-in-browser'

const START = join(import.meta.dirname, '..', '..', '..', 'out', 'cli', 'start.js')

let folder: string
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'persquare-'))
  await writeFile(join(folder, 'TB-0417.csv'), 'wafer,site\n')
})
afterAll(() => rm(folder, { recursive: true }))

interface Ended {
  readonly status: number | null
  readonly output: string
  readonly errors: string
}

/** Runs the built start command; `whenReady` is called with its address and may stop it. */
function start(
  args: readonly string[],
  env: Record<string, string> = {},
  whenReady: (url: string) => Promise<void> = () => Promise.resolve(),
): Promise<Ended> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, [START, ...args], { cwd: folder, env: { ...process.env, ...env } })
    let output = ''
    let errors = ''
    child.stderr.on('data', (part: Buffer) => (errors += part.toString()))
    child.stdout.on('data', (part: Buffer) => {
      const first = !output.includes('\n')
      output += part.toString()
      const url = /http:\S+/.exec(output)?.[0]
      if (first && url)
        whenReady(url)
          .catch(reject)
          .finally(() => child.kill('SIGTERM'))
    })
    child.on('error', reject)
    child.on('close', (status) => resolve({ status, output, errors }))
  })
}

describe('npm start', () => {
  it('serves the window and the named files where there is no Electron, and says so', async () => {
    let page = ''
    let csv = ''
    // An empty folder in place of the runtime, whatever is installed.
    const ended = await start(['TB-0417.csv', '--no-open'], { ELECTRON_OVERRIDE_DIST_PATH: folder }, async (url) => {
      page = await (await fetch(url)).text()
      csv = await (await fetch(`${url}files/0`)).text()
    })
    expect(page).toContain('<title>Persquare</title>')
    expect(csv).toBe('wafer,site\n')
    expect(ended.output).toMatch(/^Persquare is at http:\/\/127\.0\.0\.1:\d+\/[\w-]+\/ \(stop with Ctrl\+C\)\n$/)
    expect(ended.errors).toBe('Electron’s runtime is not installed here, so the window opens in a browser.\n')
    expect(ended.status).toBe(0)
  })

  it.runIf(process.platform !== 'win32')(
    'opens Electron where its runtime is there, with the named files',
    async () => {
      const runtime = await mkdtemp(join(folder, 'runtime-'))
      await writeFile(join(runtime, 'electron'), '#!/bin/sh\nprintf "%s\\n" "$@"\n')
      await chmod(join(runtime, 'electron'), 0o755)
      const ended = await start(['TB-0417.csv'], { ELECTRON_OVERRIDE_DIST_PATH: runtime })
      const [root, ...rest] = ended.output.trim().split('\n')
      expect(join(root!, 'out', 'cli', 'start.js')).toBe(START)
      expect(rest).toEqual(['--', join(folder, 'TB-0417.csv')])
      expect(ended).toMatchObject({ status: 0, errors: '' })
    },
  )

  it.each([
    [['--port', 'x'], 'The argument "--port" can\'t be used: a port is a whole number from 0 to 65535.'],
    [['--colour'], 'The argument "--colour" can\'t be used: there is no such option.'],
    [['absent.csv'], 'absent.csv: The file can\'t be read: no such file or folder.'],
  ])('%j is refused in one line, without a stack', async (args, sentence) => {
    expect(await start([...args, '--browser', '--no-open'])).toEqual({ status: 2, output: '', errors: `persquare: ${sentence}\n` })
  }) // prettier-ignore

  it('helps', async () => {
    const { status, output } = await start(['--help'])
    expect(status).toBe(0)
    expect(output).toMatch(/^usage: npm start/)
  })
})

it.each([
  ['darwin', 'open'],
  ['win32', 'rundll32'],
  ['linux', 'xdg-open'],
] as const)('on %s the browser is opened by %s, without a shell', (platform, command) => {
  const [name, args] = browserCommand(platform, 'http://127.0.0.1:1/x/')
  expect(name).toBe(command)
  expect(args.at(-1)).toBe('http://127.0.0.1:1/x/')
})
