import { onBeforeUnmount, onMounted } from 'vue'
import { mapLayers } from '../figures/layers'
import type { Direction } from '../figures/neighbours'
import { useChoicesStore } from '../stores/choices'
import { useLotStore } from '../stores/lot'
import { useSelectionStore } from '../stores/selection'
import { PAGES, useViewStore } from '../stores/view'

export const KEY_HELP: readonly { readonly keys: readonly string[]; readonly does: string }[] = [
  { keys: ['1', '–', '8'], does: 'files, lot, wafer, layer, trust, hand over, gauge, plan' },
  { keys: ['Enter'], does: 'one step in: lot, wafer, site' },
  { keys: ['Esc'], does: 'one step out' },
  { keys: ['←', '→', '↑', '↓'], does: 'neighbouring site; previous and next wafer while no site is selected' },
  { keys: ['[', ']'], does: 'previous and next wafer' },
  { keys: ['n', 'p'], does: 'next and previous site out of spec' },
  { keys: ['/'], does: 'find a wafer or a site' },
  { keys: ['l'], does: 'next map: value, deviation, concentration …' },
  { keys: ['+', '−', '0'], does: 'zoom in, out, whole wafer' },
  { keys: ['x'], does: 'exclude the site, or take it back in' },
  { keys: ['b'], does: 'pin the wafer, to compare others with it' },
  { keys: ['Ctrl', 'Z'], does: 'undo; with Shift redo' },
  { keys: ['?'], does: 'this list' },
]

const ARROWS: Readonly<Record<string, Direction>> = {
  ArrowLeft: 'left', ArrowRight: 'right', ArrowUp: 'up', ArrowDown: 'down',
} // prettier-ignore

/** The keys that work anywhere in the window but in a field that takes text. */
export function useKeys(): void {
  const view = useViewStore()
  const lot = useLotStore()
  const selection = useSelectionStore()
  const choices = useChoicesStore()

  const plain: Readonly<Record<string, () => void>> = {
    '/': () => (view.dialog = 'find'),
    '?': () => (view.dialog = 'help'),
    '[': () => selection.stepWafer(-1),
    ']': () => selection.stepWafer(1),
    l: nextLayer,
    '+': () => (view.zoomed = { factor: 1.5 }),
    '=': () => (view.zoomed = { factor: 1.5 }),
    '-': () => (view.zoomed = { factor: 1 / 1.5 }),
    '0': () => (view.zoomed = { factor: 0 }),
    n: () => goTo(1),
    p: () => goTo(-1),
    x: () => (selection.site !== null ? (view.dialog = 'exclude') : undefined),
    b: () => (selection.pinnedId = selection.pinnedId === selection.waferId ? null : selection.waferId),
    Enter: enter,
    Escape: escape,
  }

  function nextLayer(): void {
    const ids = lot.pictures ? mapLayers(lot.pictures).map(({ id }) => id) : []
    view.layer = ids[(ids.indexOf(view.layer) + 1) % ids.length] ?? 'value'
  }
  function goTo(way: 1 | -1): void {
    selection.stepOut(way)
    if (selection.site !== null) view.page = 'wafer'
  }
  function enter(): void {
    if (view.page === 'lot' && selection.wafer) view.page = 'wafer'
    else selection.goIn()
  }
  function escape(): void {
    if (view.page === 'wafer' && selection.site === null && selection.dieRow === null) view.page = 'lot'
    else selection.goOut()
  }
  function arrow(direction: Direction): void {
    if (selection.site !== null) selection.stepSite(direction)
    else selection.stepWafer(direction === 'left' || direction === 'up' ? -1 : 1)
  }
  function undoing(event: KeyboardEvent): boolean {
    const key = event.key.toLowerCase()
    if (key !== 'z' && key !== 'y') return false
    if (key === 'y' || event.shiftKey) choices.redo()
    else choices.undo()
    return true
  }
  function pageKey(key: string): boolean {
    const page = /^[1-8]$/.test(key) ? PAGES[Number(key) - 1] : undefined
    if (!page || (page.needsLot && !lot.analysis)) return false
    view.page = page.id
    return true
  }
  /** True where the key did something. */
  function act(event: KeyboardEvent): boolean {
    if (event.ctrlKey || event.metaKey) return !event.altKey && undoing(event)
    if (event.altKey) return false
    // Arrows, Enter and Escape stay: they act on what is selected, as anywhere.
    if (event.key.length === 1 && !view.hasSingleKeys) return false
    if (pageKey(event.key)) return true
    if (!lot.analysis) return event.key === '?' && run(plain['?'])
    const direction = ARROWS[event.key]
    if (direction && view.page === 'wafer' && !isWidget(event.target)) return run(() => arrow(direction))
    if (event.key === 'Enter' && isWidget(event.target)) return false
    return run(plain[event.key])
  }
  function pressed(event: KeyboardEvent): void {
    if (event.defaultPrevented || view.dialog !== null || isField(event.target)) return
    if (act(event)) event.preventDefault()
  }
  onMounted(() => document.addEventListener('keydown', pressed))
  onBeforeUnmount(() => document.removeEventListener('keydown', pressed))
}

function run(action: (() => void) | undefined): boolean {
  action?.()
  return action !== undefined
}

/** What takes letters itself. */
function isField(target: EventTarget | null): boolean {
  return target instanceof HTMLElement && target.matches('input:not([type=checkbox], [type=radio]), textarea, select')
}

/** What has a use for Enter and arrows of its own. */
function isWidget(target: EventTarget | null): boolean {
  return (
    target instanceof HTMLElement &&
    target.matches('button, a, summary, input, [role=option], [role=tab], [role=listbox]')
  )
}
