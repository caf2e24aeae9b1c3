/** What the killed and the cramped processes run: built once, started many times. Arguments: job, folder, then the job's own. */
import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { StateStore } from '../../../app/host/state-store'
import { writeWhole } from '../../../app/host/write-whole'
import { CoreError } from '../../../core/problems/problem'

const [job, folder, ...more] = process.argv.slice(2)
const say = (word: string | number): void => void process.stdout.write(`${word}\n`)
const wordOf = (error: unknown): string => JSON.stringify(error instanceof CoreError ? error.problem : String(error))

/** The files of a folder, as they are to be written. */
function filesOf(version: string): ReadonlyMap<string, Uint8Array> {
  return new Map(readdirSync(version).map((name) => [name, readFileSync(join(version, name))]))
}

/** One version after another takes the place of the one before, for ever. */
async function versions(): Promise<void> {
  const contents = more.map(filesOf)
  for (let n = 0; ; n++) {
    await writeWhole(folder, contents[n % contents.length])
    say(n)
  }
}

/** Files of their own beside the state, of very different sizes. */
async function keep(): Promise<void> {
  const store = new StateStore(folder)
  for (let n = Number(more[0]); ; n++) {
    say(await store.files.keep(new Uint8Array(((n * 7919) % 97) * 5000 + 1).fill(n % 251)))
  }
}

/** Writes once, and says how it went. */
async function once(): Promise<void> {
  await writeWhole(folder, filesOf(more[0])).then(
    () => say('written'),
    (error: unknown) => say(wordOf(error)),
  )
}

/** As many states as asked for, each said with what became of it. */
async function states(): Promise<void> {
  const [who, times] = more
  const store = new StateStore(folder)
  for (let n = 0; n < Number(times); n++) {
    const text = JSON.stringify({ who, n, filling: who.repeat(20_000) })
    await store.save(text, []).then(
      (count) => say(`${count} ${n}`),
      (error: unknown) => say(`told ${wordOf(error)}`),
    )
  }
}

const JOBS: Readonly<Record<string, () => Promise<void>>> = { versions, keep, once, states }
await JOBS[job]()
