// @vitest-environment jsdom
import { mount } from '@vue/test-utils'
import { createPinia, setActivePinia } from 'pinia'
import { beforeEach, describe, expect, it } from 'vitest'
import DecisionForm from '../../../app/renderer/parts/DecisionForm.vue'
import ProcedureField from '../../../app/renderer/parts/ProcedureField.vue'
import SymbolText from '../../../app/renderer/parts/SymbolText.vue'
import TabRow from '../../../app/renderer/parts/TabRow.vue'
import VerdictMark from '../../../app/renderer/parts/VerdictMark.vue'
import { formSections, NEW_PROCEDURE } from '../../../app/renderer/formats/procedure-text'
import { settledDecision } from '../../../app/renderer/formats/decision'
import { useChoicesStore } from '../../../app/renderer/stores/choices'

beforeEach(() => setActivePinia(createPinia()))

describe('the mark of a verdict', () => {
  it('is a shape of its own for each but the calm one', () => {
    const shapes = (['above', 'below', 'undecided', 'not-assessed'] as const).map((kind) =>
      mount(VerdictMark, { props: { kind } }).find('path').attributes('d'),
    )
    expect(new Set(shapes).size).toBe(4)
    expect(
      mount(VerdictMark, { props: { kind: 'in-spec' } })
        .find('svg')
        .exists(),
    ).toBe(false)
  })

  it('speaks only where no word stands beside it', () => {
    expect(mount(VerdictMark, { props: { kind: 'above' } }).attributes('aria-hidden')).toBe('true')
    expect(mount(VerdictMark, { props: { kind: 'above', speaks: true } }).attributes('aria-label')).toBe(
      'above its limit',
    )
  })
})

describe('tabs', () => {
  it('move by arrow keys, round the end', async () => {
    const tabs = [
      { id: 'a', title: 'A' },
      { id: 'b', title: 'B' },
    ] as const
    const row = mount(TabRow, { props: { tabs, label: 'L', panel: 'p', modelValue: 'b' } as never })
    await row.trigger('keydown', { key: 'ArrowRight' })
    expect(row.emitted('update:modelValue')).toEqual([['a']])
    expect(row.findAll('[role=tab]').map((tab) => tab.attributes('tabindex'))).toEqual(['0', '-1'])
  })
})

describe('a field of the procedure', () => {
  const fields = formSections(NEW_PROCEDURE).flatMap((section) => section.fields)
  const diameter = fields.find(({ key }) => key === 'wafer.diameterMm')!

  it('says unit, range and meaning, and the problem in their place', async () => {
    const wrapper = mount(ProcedureField, { props: { field: diameter, problem: null } })
    expect(wrapper.text()).toContain('mm')
    expect(wrapper.text()).toContain('a number above 0 and up to 1000 mm')
    await wrapper.setProps({ problem: 'Too wide.' })
    expect(wrapper.text()).toContain('Too wide.')
    expect(wrapper.find('input').attributes('aria-invalid')).toBe('true')
  })

  it('tells what is typed at once, and that it is done on change', async () => {
    const wrapper = mount(ProcedureField, { props: { field: diameter, problem: null } })
    wrapper.find('input').element.value = '150'
    await wrapper.find('input').trigger('input')
    expect(wrapper.emitted('commit')).toBeUndefined()
    await wrapper.find('input').trigger('change')
    expect(wrapper.emitted('type')).toEqual([['150']])
    expect(wrapper.emitted('commit')).toHaveLength(1)
  })
})

describe('a symbol', () => {
  it('has its index low', () => {
    expect(mount(SymbolText, { props: { text: 'R_s · x_j' } }).html()).toContain('<sub>s</sub>')
  })
})

describe('the decision', () => {
  it('is one with a choice and a name', async () => {
    const wrapper = mount(DecisionForm)
    const choices = useChoicesStore()
    await wrapper.find('input[value=hold]').setValue(true)
    expect(settledDecision(choices.now.decision)).toBeNull()
    await wrapper.find('#decision-name').setValue('R. Aldous')
    expect(settledDecision(choices.now.decision)).toMatchObject({ decision: 'hold', name: 'R. Aldous', comment: '' })
  })
})
