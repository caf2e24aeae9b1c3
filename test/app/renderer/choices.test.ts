import { createPinia, setActivePinia } from 'pinia'
import { beforeEach, describe, expect, it } from 'vitest'
import { NO_DECISION, useChoicesStore } from '../../../app/renderer/stores/choices'

const site = (name: string) => ({ wafer: '07', site: name, reason: 'scratch' })

describe('choices', () => {
  beforeEach(() => setActivePinia(createPinia()))

  it('go back and forth step by step, and a new step ends what was undone', () => {
    const choices = useChoicesStore()
    choices.change('excluding site 1', { excluded: [site('1')] })
    choices.change('excluding site 2', { excluded: [site('1'), site('2')] })
    expect([choices.undoLabel, choices.redoLabel]).toEqual(['excluding site 2', null])
    choices.undo()
    expect(choices.now.excluded).toEqual([site('1')])
    choices.undo()
    expect(choices.now.excluded).toEqual([])
    choices.undo()
    choices.redo()
    expect(choices.now.excluded).toEqual([site('1')])
    choices.change('excluding site 3', { excluded: [site('3')] })
    expect(choices.redoLabel).toBeNull()
    choices.undo()
    expect(choices.now.excluded).toEqual([site('1')])
  })

  it('take typing into one field for one step', () => {
    const choices = useChoicesStore()
    for (const name of ['R', 'R.', 'R. A']) choices.change('the name', { decision: { ...NO_DECISION, name } }, true)
    choices.change('the comment', { decision: { ...choices.now.decision, comment: 'x' } }, true)
    choices.undo()
    expect(choices.now.decision.name).toBe('R. A')
    choices.undo()
    expect(choices.now.decision.name).toBe('')
  })

  it('are unsaved from the first decision until they are handed over', () => {
    const choices = useChoicesStore()
    expect(choices.isUnsaved).toBe(false)
    choices.change('the decision', { decision: { ...NO_DECISION, decision: 'hold' } })
    expect(choices.isUnsaved).toBe(true)
    choices.markHandedOver()
    expect(choices.isUnsaved).toBe(false)
    choices.change('excluding site 1', { excluded: [site('1')] })
    expect(choices.isUnsaved).toBe(true)
  })

  it('that are put back can’t be undone', () => {
    const choices = useChoicesStore()
    choices.restore({ ...choices.now, excluded: [site('1')] })
    expect(choices.undoLabel).toBeNull()
    choices.undo()
    expect(choices.now.excluded).toEqual([site('1')])
  })
})
