/** How things were looked at, for the session that outlives a crash. What is no longer understood is left aside. */
import { LAYER_IDS } from '../figures/map-layer'
import type { KeptView } from '../persistence/keep-stores'
import { useSelectionStore } from '../stores/selection'
import { COMPARISONS, GAUGE_TABS, LEAVES, ORDERS, PAGES, THEMES, TRUST_TABS, useViewStore } from '../stores/view'

type Check = (value: unknown) => boolean

const oneOf =
  (known: readonly unknown[]): Check =>
  (value) =>
    known.includes(value)
const isFlag: Check = (value) => typeof value === 'boolean'
const isName: Check = (value) => value === null || typeof value === 'string'

const VIEW_CHECKS: Readonly<Record<string, Check>> = {
  page: oneOf(PAGES.map(({ id }) => id)),
  leaf: oneOf(LEAVES.map(({ id }) => id)),
  trust: oneOf(TRUST_TABS.map(({ id }) => id)),
  gauge: oneOf(GAUGE_TABS.map(({ id }) => id)),
  layer: oneOf(LAYER_IDS),
  order: oneOf(ORDERS),
  comparison: oneOf(COMPARISONS),
  theme: oneOf(THEMES),
  hasSingleKeys: isFlag,
  showsContours: isFlag,
  showsSites: isFlag,
  showsDies: isFlag,
  figure: (value) => typeof value === 'string',
  lineAngle_deg: (value) => typeof value === 'number' && value >= 0 && value <= 180,
}
const SELECTION_CHECKS: Readonly<Record<string, Check>> = { waferId: isName, siteName: isName, pinnedId: isName }

export function useKeptView(): KeptView {
  const view = useViewStore()
  const selection = useSelectionStore()
  return {
    read: () => ({ ...kept(view.$state, VIEW_CHECKS), ...kept(selection.$state, SELECTION_CHECKS) }),
    restore: (found) => {
      view.$patch(kept(found, VIEW_CHECKS))
      selection.$patch(kept(found, SELECTION_CHECKS))
    },
  }
}

function kept(from: object, checks: Readonly<Record<string, Check>>): Record<string, unknown> {
  return Object.fromEntries(Object.entries(from).filter(([key, value]) => checks[key]?.(value) ?? false))
}
