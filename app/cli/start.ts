/**
 * `npm start`: the window. Under Electron where its runtime is there, otherwise in a browser of this computer over the
 * loopback host.
 */
import { spawn } from 'node:child_process'
import { access, constants } from 'node:fs/promises'
import { basename, join, resolve } from 'node:path'
import { parseArgs } from 'node:util'
import { explain } from '../../core/problems/explain'
import { CoreError } from '../../core/problems/problem'
import { systemReason } from '../../core/problems/system-reason'
import { startLoopbackHost } from '../browser/loopback-host'
import { demoPaths } from '../host/demo-lot'
import { stateFolder } from '../host/state-folder'
import { electronRuntime } from './electron-runtime'
import { openInBrowser } from './open-in-browser'
import { PROGRAM, VERSION } from './version'

const usage = `usage: npm start -- [FILE...] [--browser] [--port N] [--no-open]

  FILE         readings (CSV) and a procedure (JSON) to open
  --browser    in a browser of this computer, even where Electron is installed
  --port N     port of the loopback address (default: any that is free)
  --no-open    print the address, but open no browser`

interface Choices {
  readonly files: readonly string[]
  readonly browser: boolean
  readonly port: number
  readonly open: boolean
}

/** The program's folder, from app/cli and from out/cli alike. */
const ROOT = join(import.meta.dirname, '..', '..')

async function start(args: readonly string[]): Promise<number> {
  if (args.includes('--help') || args.includes('-h')) {
    console.log(usage)
    return 0
  }
  const choices = readChoices(args)
  await requireReadable(choices.files)
  const runtime = choices.browser ? null : await electronRuntime()
  if (runtime !== null) return runElectron(runtime, choices.files)
  console.error(
    choices.browser
      ? 'In a browser, as asked for.'
      : 'Electron’s runtime is not installed here, so the window opens in a browser.',
  )
  return serve(choices)
}

/** @throws CoreError bad-argument */
function readChoices(args: readonly string[]): Choices {
  const { values, positionals } = parsed(args)
  const port = Number(values.port ?? 0)
  if (!Number.isInteger(port) || port < 0 || port > 65535) {
    throw new CoreError({ kind: 'bad-argument', argument: '--port', why: 'a port is a whole number from 0 to 65535' })
  }
  return {
    files: positionals.map((path) => resolve(path)),
    browser: values.browser ?? false,
    port,
    open: !(values['no-open'] ?? false),
  }
}

function parsed(args: readonly string[]) {
  try {
    return parseArgs({
      args: [...args],
      allowPositionals: true,
      options: { browser: { type: 'boolean' }, port: { type: 'string' }, 'no-open': { type: 'boolean' } },
    })
  } catch (error) {
    const { code, message } = error as NodeJS.ErrnoException
    const argument = /'(-[^' ]*)/.exec(message)?.[1] ?? args.join(' ')
    const why = code === 'ERR_PARSE_ARGS_UNKNOWN_OPTION' ? 'there is no such option' : message
    throw new CoreError({ kind: 'bad-argument', argument, why })
  }
}

/** Before any window: a slip in a name is best told where it was typed. */
async function requireReadable(paths: readonly string[]): Promise<void> {
  for (const path of paths) {
    try {
      await access(path, constants.R_OK)
    } catch (error) {
      throw new CoreError({ kind: 'cannot-read', file: basename(path), why: systemReason(error) })
    }
  }
}

function runElectron(runtime: string, files: readonly string[]): Promise<number> {
  return new Promise((resolve, reject) => {
    const child = spawn(runtime, [ROOT, '--', ...files], { stdio: 'inherit' })
    child.once('error', reject)
    child.once('exit', (code) => resolve(code ?? 0))
  })
}

/** Runs until it is interrupted. */
async function serve({ files, port, open }: Choices): Promise<number> {
  const root = join(ROOT, 'out', 'renderer')
  try {
    const host = await startLoopbackHost({
      port,
      root,
      files,
      demo: demoPaths(ROOT),
      stateFolder: stateFolder(),
      program: { program: PROGRAM, version: VERSION },
    })
    console.log(`Persquare is at ${host.url} (stop with Ctrl+C)`)
    if (open) openInBrowser(host.url)
    await interrupted()
    await host.close()
    return 0
  } catch (error) {
    throw new CoreError({ kind: 'bad-argument', argument: `--port ${port}`, why: systemReason(error) })
  }
}

function interrupted(): Promise<void> {
  return new Promise((resolve) => {
    process.once('SIGINT', () => resolve())
    process.once('SIGTERM', () => resolve())
  })
}

start(process.argv.slice(2)).then(
  (status) => {
    process.exitCode = status
  },
  (error: unknown) => {
    console.error(`persquare: ${error instanceof CoreError ? explain(error.problem) : systemReason(error)}`)
    process.exitCode = 2
  },
)
