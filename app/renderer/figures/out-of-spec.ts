/** The way from one site that is out of spec to the next, through the wafers in slot order. */
import type { LotPictures } from './lot-pictures'

const OUT_OF_SPEC = 1

/** Row of the site columns, going round at the end; null where no site is out. */
export function nextOutOfSpec(pictures: LotPictures, waferId: string | null, site: number | null, way: 1 | -1): number | null {
  const { wafers, analysis } = pictures
  const order = wafers.flatMap((wafer) => Array.from(wafer.sites, (row) => ({ id: wafer.id, row })))
  const isOut = ({ row }: { row: number }): boolean => analysis.sites.verdict[row] === OUT_OF_SPEC
  if (order.length === 0) return null
  const start = site === null ? order.findIndex(({ id }) => id === waferId) - (way > 0 ? 1 : 0) : order.findIndex(({ row }) => row === site)
  for (let k = 1; k <= order.length; k++) {
    const here = order[(((start + way * k) % order.length) + order.length) % order.length]
    if (isOut(here)) return here.row
  }
  return null
} // prettier-ignore
