/** Procedures of every sort, alone: read to the same procedure again, or refused with a reason for each thing wrong. */
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { parseProcedure } from '../../core/procedure/parse-procedure'
import { damagedProcedures } from './damaged-procedures'
import { fuzz, inTime, PATIENCE_MS } from './fuzz-runs'
import { halfShapedProcedures, shapedProcedures } from './shaped-procedures'
import { soundProcedures, type Json } from './sound-procedures'
import { checkProblems, require, Words } from './sound-result'

function check(text: string): boolean {
  const { procedure, problems } = inTime(() => parseProcedure(text, 'procedure.json'))
  checkProblems(problems, new Words(text))
  require((procedure === null) === problems.length > 0, () =>
    `procedure ${procedure === null} problems ${problems.length}`)
  expect(({} as Record<string, unknown>)['polluted']).toBeUndefined()
  if (procedure === null) return false
  const again = parseProcedure(JSON.stringify(procedure), 'procedure.json')
  expect(again.problems).toEqual([])
  expect(again.procedure).toEqual(procedure)
  return true
}

const textOf = (procedure: Json) => JSON.stringify(procedure)

describe('procedures', () => {
  it(
    'that are sound are read',
    () => {
      fuzz('sound procedures', 3, soundProcedures.map(textOf), (text) => require(check(text), () => `refused: ${text}`))
    },
    PATIENCE_MS,
  )

  it(
    'made blindly from the shape, or damaged, are read or refused',
    () => {
      const texts = fc.oneof(damagedProcedures, shapedProcedures.map(textOf), halfShapedProcedures.map(textOf))
      fuzz('damaged procedures', 12, texts, check)
    },
    PATIENCE_MS,
  )
})
