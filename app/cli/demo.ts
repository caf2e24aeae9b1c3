/** `npm run demo`: analyses a bundled lot and says how to go on. */
import { fileURLToPath } from 'node:url'
import { join } from 'node:path'
import { analyzeLot, EXIT } from './analyze'
import { ARTIFACTS, type Artifact } from './output-files'

const root = fileURLToPath(new URL('../..', import.meta.url))
const lot = join('sample-data', 'TB-0417.csv')
const procedure = join('sample-data', 'TB-0417.procedure.json')

process.chdir(root)
const status = await analyzeLot({
  files: [lot],
  procedure,
  out: join('out', 'demo'),
  write: Object.keys(ARTIFACTS) as Artifact[],
  date: null,
  paper: 'A4',
  output: 'table',
})
console.log(`\nThe same by hand:    npx persquare analyze ${lot} --procedure ${procedure} --out out/demo`)
console.log(`Open it in a window: npm start -- ${lot} ${procedure}`)
// The invented lot is out of spec on purpose: for a demonstration that is success.
process.exitCode = status === EXIT.notAnalysed ? status : 0
