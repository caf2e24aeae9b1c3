/**
 * `npm run fuzz`: every target in turn, guided by what it reaches, until as many inputs were tried as wanted
 * (`PERSQUARE_FUZZ_INPUTS`, a million) or the time is over (`PERSQUARE_FUZZ_MINUTES`). What fails is written to
 * test/fuzz/corpus/guided, to be looked at, mended and kept.
 */
import { createHash } from 'node:crypto'
import { mkdirSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { searcher } from './search'
import { TARGETS } from './targets'

const WANTED = Number(process.env['PERSQUARE_FUZZ_INPUTS'] ?? 1_000_000)
const MINUTES = Number(process.env['PERSQUARE_FUZZ_MINUTES'] ?? Infinity)
const SEED = Number(process.env['PERSQUARE_FUZZ_SEED'] ?? 417)
const STEP = 200

const root = process.cwd()
const branches = (globalThis as unknown as { __branches?: Uint8Array }).__branches ?? null
const searches = TARGETS.map((target, at) => searcher(target, { root, seed: SEED + at, branches }))
const begin = performance.now()
const minutes = (): number => (performance.now() - begin) / 60_000
const tried = (): number => searches.reduce((sum, { found }) => sum + found.inputs, 0)

let told = 0
while (tried() < WANTED && minutes() < MINUTES) {
  for (const { step } of searches) step(STEP)
  if (minutes() - told > 0.5) {
    told = minutes()
    console.log(`${tried()} inputs in ${told.toFixed(1)} min`)
  }
}

const rate = tried() / (minutes() * 60)
for (const { found } of searches) {
  const { target, inputs, corpus, branches: reached, slowest_ms, failures } = found
  console.log(`${target}: ${inputs} inputs, ${reached} branches, ${corpus.length} that led on, slowest ${slowest_ms.toFixed(0)} ms, ${failures.length} failed`) // prettier-ignore
}
console.log(
  `${tried()} inputs, seed ${SEED}, ${rate.toFixed(0)} a second; a million takes ${(1e6 / rate / 60).toFixed(0)} min`,
)

const failures = searches.flatMap(({ found }) => found.failures)
for (const { target, bytes, why } of failures) {
  const folder = join(root, 'test', 'fuzz', 'corpus', 'guided', target.replaceAll(' ', '-'))
  const name = createHash('sha256').update(bytes).digest('hex').slice(0, 12)
  mkdirSync(folder, { recursive: true })
  writeFileSync(join(folder, name), bytes)
  console.error(`${target}/${name}: ${why}`)
}
process.exitCode = failures.length > 0 ? 1 : 0
