import { defineStore } from 'pinia'
import { ref, shallowRef } from 'vue'
import type { LayerId } from '../figures/map-layer'
import type { RackOrder } from '../figures/lot-pictures'

/** In the order of the work; the last two are of the bench and need no lot. */
export const PAGES = [
  { id: 'files', title: 'Files', needsLot: false },
  { id: 'lot', title: 'Lot', needsLot: true },
  { id: 'wafer', title: 'Wafer', needsLot: true },
  { id: 'layer', title: 'Layer', needsLot: true },
  { id: 'trust', title: 'Trust', needsLot: true },
  { id: 'hand-over', title: 'Hand over', needsLot: true },
  { id: 'gauge', title: 'Gauge', needsLot: false },
  { id: 'plan', title: 'Plan', needsLot: false },
] as const
export type Page = (typeof PAGES)[number]
export type PageId = Page['id']

/** How far the lot's measurement can be trusted. */
export const TRUST_TABS = [
  { id: 'uncertainty', title: 'Uncertainty' },
  { id: 'risk', title: 'Risk' },
  { id: 'readings', title: 'Readings' },
  { id: 'map', title: 'Map' },
] as const
export type TrustTab = (typeof TRUST_TABS)[number]['id']

export const GAUGE_TABS = [
  { id: 'study', title: 'Gauge study' },
  { id: 'check', title: 'Check wafer' },
] as const
export type GaugeTab = (typeof GAUGE_TABS)[number]['id']

export const LEAVES = [
  { id: 'working', title: 'Working' },
  { id: 'figures', title: 'Figures' },
  { id: 'sites', title: 'Sites' },
  { id: 'findings', title: 'Findings' },
] as const
export type LeafId = (typeof LEAVES)[number]['id']

export const ORDERS = ['slot', 'mean', 'spread', 'verdict'] as const satisfies readonly RackOrder[]
export const COMPARISONS = ['none', 'beside', 'difference', 'lot-mean'] as const
export type Comparison = (typeof COMPARISONS)[number]
export const THEMES = ['system', 'light', 'dark'] as const
export type Theme = (typeof THEMES)[number]

/** How things are looked at; nothing here changes a number. */
export const useViewStore = defineStore('view', () => {
  const page = ref<PageId>('files')
  const leaf = ref<LeafId>('working')
  const trust = ref<TrustTab>('uncertainty')
  const gauge = ref<GaugeTab>('study')
  const layer = ref<LayerId>('value')
  const order = ref<RackOrder>('slot')
  const showsContours = ref(true)
  const showsSites = ref(true)
  const showsDies = ref(false)
  const comparison = ref<Comparison>('none')
  const figure = ref('radial')
  const lineAngle_deg = ref(0)
  const theme = ref<Theme>('system')
  /** Letters and digits alone command something; off for who dictates, or rests a hand on the keys. */
  const hasSingleKeys = ref(true)
  const dialog = ref<'find' | 'help' | 'exclude' | 'findings' | null>(null)
  /** Asked for from afar, and done by the part that can; a factor of 0 is the whole wafer. */
  const zoomed = shallowRef<{ readonly factor: number } | null>(null)
  const request = ref<'save' | 'print' | null>(null)
  return {
    page, leaf, trust, gauge, layer, order, showsContours, showsSites, showsDies, comparison, figure, lineAngle_deg, theme, hasSingleKeys, dialog, zoomed,
    request,
  } // prettier-ignore
})
