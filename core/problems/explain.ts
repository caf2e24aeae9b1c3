import type { Problem, ProblemKind } from './problem'
import { quote, quotedList } from './quote'

/** One or two sentences: what is wrong, where, and what would mend it. The only place such sentences are written. */
export function explain(problem: Problem): string {
  const place = placeOf(problem)
  const sentence = (sentences[problem.kind] as (problem: Problem) => string)(problem)
  return place === '' ? sentence : `${place}: ${sentence}`
}

/** `TB-0417.csv, line 12, column voltage_V`; empty where the problem has no place. */
export function placeOf(problem: Problem): string {
  const parts: string[] = []
  if ('file' in problem) parts.push(bare(problem.file))
  if ('line' in problem) parts.push(`line ${problem.line}`)
  if ('column' in problem && problem.column !== '' && 'line' in problem) parts.push(`column ${bare(problem.column)}`)
  if ('key' in problem && problem.key !== '') parts.push(bare(problem.key))
  return parts.join(', ')
}

/** A name as it stands, escaped and cut like a quotation. */
function bare(text: string): string {
  return quote(text).slice(1, -1)
}

function count(number: number, one: string, many = `${one}s`): string {
  return `${number} ${number === 1 ? one : many}`
}

/** Ends a clause that came from elsewhere as a sentence. */
function ended(text: string): string {
  return /[.!?]$/.test(text) ? text : `${text}.`
}

function asUnit(unit: string): string {
  return unit === '' || unit === '1' ? '' : ` ${unit}`
}

function rangeOf(min: number, max: number, unit: string): string {
  if (min === -Infinity && max === Infinity) return `a number${asUnit(unit)}`
  if (max === Infinity) return `at least ${min}${asUnit(unit)}`
  if (min === -Infinity) return `at most ${max}${asUnit(unit)}`
  return `from ${min} to ${max}${asUnit(unit)}`
}

type Sentences = { readonly [Kind in ProblemKind]: (problem: Extract<Problem, { kind: Kind }>) => string }

/** Without the place, which `explain` puts in front. */
const sentences: Sentences = {
  'out-of-range': ({ quantity, value, unit, min, max }) =>
    Number.isNaN(value)
      ? `The ${quantity} is not a number; it must be ${rangeOf(min, max, unit)}.`
      : `The ${quantity} is ${value}${asUnit(unit)}; it must be ${rangeOf(min, max, unit)}.`,
  'unknown-id': ({ family, id, known }) => `There is no ${family} ${quote(id)}. Known are ${quotedList(known)}.`,
  'not-applicable': ({ what, why }) => `${capital(what)} does not apply here: ${ended(why)}`,
  'kept-elsewhere': () =>
    'Another window keeps its own lot now. Hand over what you did in this one, or export it, before you close it.',

  'cannot-read': ({ why }) => `The file can't be read: ${ended(why)}`,
  'empty-file': () => 'The file is empty. Export the readings again.',
  'not-text': ({ looksLike }) => `This is no text file; it looks like ${looksLike}. Export the readings as CSV.`,
  'no-header': ({ firstLine }) =>
    `No line with column names was found. The file begins with ${quote(firstLine)}; add a line such as wafer,x_mm,y_mm,current_A,voltage_V.`,
  'no-readings': ({ rows, rejected }) =>
    rows === 0
      ? 'There are column names but no rows under them.'
      : `None of its ${count(rows, 'row')} can be used${rejected > 0 ? ` (${rejected} rejected, each listed with its reason)` : ''}.`,
  'missing-column': ({ wanted, headers }) =>
    `No column was found for ${wanted}. The columns are ${quotedList(headers)}; name the right one under readings.columns in the procedure.`,
  'ambiguous-column': ({ column, candidates }) =>
    `Several columns could be ${column}: ${quotedList(candidates)}. Say which under readings.columns in the procedure.`,
  'unknown-unit': ({ header, unit, known }) =>
    `The unit ${quote(unit)} of column ${quote(header)} is not known here. Known are ${quotedList(known)}.`,
  'line-too-long': ({ length, max }) =>
    `The line has ${length} characters, more than the ${max} that a row may have. A quotation mark may be missing its partner.`,
  'mixed-files': ({ what, first, found }) =>
    `Its ${what} is ${quote(found)} but that of the first file is ${quote(first)}. Analyse files of one kind together.`,

  'bad-cell': ({ found, why }) => `${quote(found)} ${why}; the row was left out.`,
  'bad-row': ({ found, why }) => `The row was left out${found === '' ? '' : ` at ${quote(found)}`}: ${ended(why)}`,
  'doubled-site': ({ wafer, site, firstLine }) =>
    `Site ${quote(site)} of wafer ${quote(wafer)} was already read in line ${firstLine}. Remove one of the two, or give them different site names.`,

  'bad-table': ({ line, why }) =>
    line === undefined ? `This table can't be used: ${ended(why)}` : `This row was left out: ${ended(why)}`,
  'bad-profile': ({ why }) => `The depth profile can't be used: ${ended(why)}`,

  'not-json': ({ why }) => `This is no valid JSON: ${ended(why)}`,
  'unknown-key': ({ nearest, known }) => `A procedure has no such key. ${unknownKeyHint(nearest, known)}`,
  'bad-value': ({ found, allowed }) => `Found ${bare(found)}; allowed is ${ended(allowed)}`,
  'missing-key': ({ why }) => `This key is missing; it is needed because ${ended(why)}`,
  'missing-file': ({ name }) =>
    `The file ${quote(name)}, which the procedure names here, is not there. Put it beside the procedure, under just this name.`,
  'limits-reversed': ({ key, lower, upper }) =>
    key.endsWith('.target')
      ? `The target lies outside its limits: ${lower} should not be above ${upper}.`
      : `The lower limit, ${lower}, is above the upper, ${upper}. Swap them.`,

  'site-off-wafer': ({ wafer, site, radius_mm, edge_mm }) =>
    `Site ${quote(site)} of wafer ${quote(wafer)} lies ${decimal(radius_mm)} mm from the centre, off the wafer (edge at ${decimal(edge_mm)} mm). Check the unit of the positions and the wafer's size.`,
  'pin-off-wafer': ({ wafer, site }) =>
    `At site ${quote(site)} of wafer ${quote(wafer)} a pin of the probe stands off the wafer, so no correction exists. Check the position, the probe spacing and the pin line's direction.`,
  'no-sheet-resistance': ({ wafer, site, why }) =>
    `Site ${quote(site)} of wafer ${quote(wafer)} has no sheet resistance: ${ended(why)}`,
  'swapped-columns': ({ asRead, swapped, unit }) =>
    `Current and voltage look swapped: as read the median is ${Number(asRead.toPrecision(4))}${asUnit(unit)}, swapped it would be ${Number(swapped.toPrecision(4))}${asUnit(unit)}. Check the column names.`,
  'flagged-sites': ({ count: sites, wafers, sentence }) =>
    `${count(sites, 'site')} on ${wafers.length === 1 ? 'wafer' : 'wafers'} ${quotedList(wafers)}: each ${ended(sentence)}`,
  'no-such-site': ({ wafer, site }) =>
    `Site ${quote(site)} of wafer ${quote(wafer)} was to be excluded, but these readings have no such site. Take the exclusion back, or check the wafer's and site's names.`,
  'suspicious-readings': ({ sentence, nextStep }) => `${sentence} ${nextStep}`,
  'check-wafer-alarm': ({ sentence }) => sentence,
  'nothing-assessed': ({ why }) => `Nothing could be judged: ${ended(why)}`,

  'cannot-write': ({ path, why }) => `${quote(path)} can't be written: ${ended(why)}`,
  'bad-argument': ({ argument, why }) => `The argument ${quote(argument)} can't be used: ${ended(why)}`,
}

function unknownKeyHint(nearest: string | null, known: readonly string[]): string {
  if (nearest !== null) return `Was ${nearest} meant?`
  return known.length === 0 ? 'Leave it out.' : `Allowed here: ${known.join(', ')}.`
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1)
}

function decimal(value_mm: number): string {
  return value_mm.toFixed(1)
}
