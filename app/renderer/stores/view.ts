import { defineStore } from 'pinia'
import { ref, shallowRef } from 'vue'
import type { LayerId } from '../figures/layers'
import type { RackOrder } from '../figures/lot-pictures'

export const PAGES = [
  { id: 'files', title: 'Files' },
  { id: 'lot', title: 'Lot' },
  { id: 'wafer', title: 'Wafer' },
  { id: 'layer', title: 'Layer' },
  { id: 'hand-over', title: 'Hand over' },
] as const
export type PageId = (typeof PAGES)[number]['id']

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
  const layer = ref<LayerId>('value')
  const order = ref<RackOrder>('slot')
  const showsContours = ref(true)
  const showsSites = ref(true)
  const showsDies = ref(false)
  const comparison = ref<Comparison>('none')
  const figure = ref('radial')
  const lineAngle_deg = ref(0)
  const theme = ref<Theme>('system')
  const dialog = ref<'find' | 'help' | 'exclude' | 'findings' | null>(null)
  /** Asked for from afar, and done by the part that can; a factor of 0 is the whole wafer. */
  const zoomed = shallowRef<{ readonly factor: number } | null>(null)
  const request = ref<'save' | 'print' | null>(null)
  return {
    page, leaf, layer, order, showsContours, showsSites, showsDies, comparison, figure, lineAngle_deg, theme, dialog, zoomed, request,
  } // prettier-ignore
})
