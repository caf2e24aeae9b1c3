import { defineStore } from 'pinia'
import { ref } from 'vue'
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

export type LeafId = 'working' | 'figures' | 'sites' | 'findings'
export type Comparison = 'none' | 'beside' | 'difference' | 'lot-mean'
export type Theme = 'system' | 'light' | 'dark'

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
  const dialog = ref<'find' | 'help' | 'exclude' | null>(null)
  return {
    page, leaf, layer, order, showsContours, showsSites, showsDies, comparison, figure, lineAngle_deg, theme, dialog,
  } // prettier-ignore
})
