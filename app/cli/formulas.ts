/** `persquare formulas`: every formula that the program computes by, with its source. */
import { appendixAsMarkdown, formulaAppendix } from '../../core/report/formula-appendix'

export function formulasCommand(args: readonly string[]): number {
  const [word = '', ...more] = args
  if (more.length > 0 || word.startsWith('-')) {
    console.error('persquare formulas: it takes one word at most; persquare formulas --help')
    return 2
  }
  const wanted = word.toLowerCase()
  const chapters = formulaAppendix()
    .map(({ title, formulas }) => ({
      title,
      formulas: formulas.filter((entry) => [entry.title, entry.formula, entry.source].some((text) => text.toLowerCase().includes(wanted))),
    }))
    .filter(({ formulas }) => formulas.length > 0)
  if (chapters.length === 0) {
    console.error(`persquare formulas: no formula has "${word}" in its name, text or source`)
    return 2
  }
  process.stdout.write(appendixAsMarkdown(chapters))
  return 0
} // prettier-ignore
