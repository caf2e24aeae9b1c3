#!/usr/bin/env node
import { checkCommand, CHECK_USAGE } from './check'
import { gaugeCommand, GAUGE_USAGE } from './gauge'
import { explain } from '../../core/problems/explain'
import { CoreError } from '../../core/problems/problem'
import { CONVERT_USAGE, convertCommand } from './convert'
import { SITES_USAGE, sitesCommand } from './sites'
import { PROGRAM, VERSION } from './version'

const ANALYZE_USAGE = `usage: persquare analyze FILE... --procedure FILE [--out DIR] [options]

  FILE                 one CSV, or several of the same lot
  --procedure FILE     the procedure (JSON) that says how to correct and judge them
  --out DIR            where result.json, sites.csv, dies.csv and report.pdf go
  --write LIST         only these of json,sites,dies,pdf (default: all)
  --date DATE          the report's date (default: the latest reading's time)
  --paper SIZE         A4 or Letter (default: A4)
  --json               print result.json instead of the table
  --quiet              print nothing but errors

exit status: 0 analysed and in spec; 1 analysed, something is out of spec, undecided or not assessed; 2 not analysed`

const VERIFY_USAGE = `usage: persquare verify REPORT.pdf [--json]

  REPORT.pdf           a report written by analyze; it carries its inputs, and is made again from them
  --json               print one object instead of sentences

exit status: 0 the report is what comes out of its inputs; 1 something in it differs; 2 it is no report that can be read`

const UNCERTAINTY_USAGE = `usage: persquare uncertainty FILE --procedure FILE [options]

  FILE                 the lot's CSV
  --procedure FILE     the procedure (JSON), with the components of uncertainty
  --wafer NAME         the wafer (default: the one whose working the report sets out)
  --site NAME          its site (default: the one of the report, or the wafer's first)
  --trials N           draws of the Monte Carlo calculation, 1000 to 2000000 (default: 100000)
  --seed N             of its draws (default: 20260316)
  --json               print one object instead of the tables

exit status: 0 the first-order budget is enough there; 1 it is not; 2 not done`

const FORMULAS_USAGE = `usage: persquare formulas [WORD]

  WORD                 only the formulas whose name, text or source has it

Prints every formula that the program computes by, with its range and source, as Markdown.`

interface Command {
  /** Exit status: 0 done, and in spec where something was judged; 1 judged and not in spec throughout; 2 not done. */
  readonly run: (args: readonly string[]) => Promise<number>
  /** Its first line stands for it in the list of all commands. */
  readonly usage: string
}

const commands: Record<string, Command> = {
  // Loaded when asked for: the readers and the PDF writer behind it take longer to load than a conversion to make.
  analyze: { run: async (args) => (await import('./analyze')).analyzeCommand(args), usage: ANALYZE_USAGE },
  verify: { run: async (args) => (await import('./verify')).verifyCommand(args), usage: VERIFY_USAGE },
  convert: { run: convertCommand, usage: CONVERT_USAGE },
  gauge: { run: gaugeCommand, usage: GAUGE_USAGE },
  check: { run: checkCommand, usage: CHECK_USAGE },
  uncertainty: {
    run: async (args) => (await import('./uncertainty')).uncertaintyCommand(args),
    usage: UNCERTAINTY_USAGE,
  },
  sites: { run: sitesCommand, usage: SITES_USAGE },
  formulas: {
    run: async (args) => (await import('./formulas')).formulasCommand(args),
    usage: FORMULAS_USAGE,
  },
}

const usage = [
  ...Object.values(commands).map((command) => command.usage.split('\n', 1)[0]),
  '',
  'persquare COMMAND --help tells what a command takes; persquare --version',
].join('\n')

async function main(args: readonly string[]): Promise<number> {
  const [name, ...rest] = args
  if (name === '--version' || name === '-V') {
    console.log(`${PROGRAM} ${VERSION}`)
    return 0
  }
  if (name === undefined || name === '--help' || name === '-h' || name === 'help') {
    console.log(usage)
    return name === undefined ? 2 : 0
  }
  const command = Object.hasOwn(commands, name) ? commands[name] : undefined
  if (!command || rest.includes('--help')) {
    if (command) console.log(command.usage)
    else
      console.error(`persquare: there is no command "${name}". The commands are: ${Object.keys(commands).join(', ')}.`)
    return command ? 0 : 2
  }
  return command.run(rest)
}

main(process.argv.slice(2)).then(
  (status) => {
    process.exitCode = status
  },
  (error: unknown) => {
    const known = error instanceof CoreError ? explain(error.problem) : null
    console.error(
      known
        ? `persquare: ${known}`
        : `persquare: internal error: ${error instanceof Error ? error.message : String(error)}`,
    )
    if (process.env['PERSQUARE_DEBUG'] && error instanceof Error) console.error(error.stack)
    process.exitCode = 2
  },
)

// A reader that stops early (`| head`) is no error of ours.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code !== 'EPIPE') throw error
})
