import { defineStore } from 'pinia'
import { computed, ref } from 'vue'
import type { WaferAnalysis } from '../../../core/analysis/lot-analysis'
import { centralRow, neighbour, type Direction } from '../figures/neighbours'
import { nextOutOfSpec } from '../figures/out-of-spec'
import { useLotStore } from './lot'

/** The one selection: the lot, a wafer, a site or a die of it. Wafers and sites go by name, so that it outlives an analysis. */
export const useSelectionStore = defineStore('selection', () => {
  const lot = useLotStore()
  const waferId = ref<string | null>(null)
  const siteName = ref<string | null>(null)
  const dieRow = ref<number | null>(null)
  const pinnedId = ref<string | null>(null)

  const wafer = computed(() => waferOf(waferId.value))
  const pinned = computed(() => waferOf(pinnedId.value))
  /** Row of the lot's site columns. */
  const site = computed(() => {
    const name = siteName.value
    const readings = lot.analysis?.readings
    if (!wafer.value || name === null || !readings) return null
    return wafer.value.sites.find((i) => readings.siteNames[readings.site[i]] === name) ?? null
  })

  function waferOf(id: string | null): WaferAnalysis | null {
    return lot.pictures?.wafers.find((entry) => entry.id === id) ?? null
  }
  function selectWafer(id: string | null): void {
    waferId.value = id
    dieRow.value = null
    if (id === null) siteName.value = null
  }
  function selectSite(row: number | null): void {
    const readings = lot.analysis?.readings
    dieRow.value = null
    if (row === null || !readings) siteName.value = null
    else {
      waferId.value = readings.wafers[readings.wafer[row]].id
      siteName.value = readings.siteNames[readings.site[row]]
    }
  }
  function selectDie(row: number | null): void {
    siteName.value = null
    dieRow.value = row
  }
  /** The wafer so many places on in slot order. */
  function stepWafer(step: number): void {
    const wafers = lot.pictures?.wafers ?? []
    const at = wafers.findIndex(({ id }) => id === waferId.value)
    const to = at < 0 ? 0 : Math.min(wafers.length - 1, Math.max(0, at + step))
    if (wafers[to]) selectWafer(wafers[to].id)
  }
  function stepSite(direction: Direction): void {
    const places = lot.pictures?.positions
    const sites = wafer.value?.sites
    if (!places || !sites || site.value === null) return
    const [x, y] = [places.x_mm, places.y_mm].map((column) => Float64Array.from(sites, (i) => column[i]))
    selectSite(sites[neighbour(x, y, sites.indexOf(site.value), direction)])
  }
  function stepOut(way: 1 | -1): void {
    const found = lot.pictures && nextOutOfSpec(lot.pictures, waferId.value, site.value, way)
    if (found !== null && found !== undefined) selectSite(found)
  }
  /** One step in: from the lot to its first wafer, from a wafer to its central site. */
  function goIn(): void {
    if (!wafer.value) return stepWafer(0)
    const places = lot.pictures?.positions
    const { sites } = wafer.value
    if (site.value !== null || sites.length === 0) return
    const [x, y] = [places?.x_mm, places?.y_mm].map((column) => Float64Array.from(sites, (i) => column?.[i] ?? NaN))
    selectSite(sites[Math.max(0, centralRow(x, y))])
  }
  function goOut(): void {
    if (siteName.value !== null || dieRow.value !== null) selectSite(null)
    else selectWafer(null)
  }

  return {
    waferId, siteName, dieRow, pinnedId, wafer, pinned, site,
    selectWafer, selectSite, selectDie, stepWafer, stepSite, stepOut, goIn, goOut,
  } // prettier-ignore
})
