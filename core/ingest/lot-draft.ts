/** A lot while its files are read. */
import type { FileProblem } from '../problems/problem'
import { GrowingColumns } from './columns'
import { SiteNames, WaferLabels } from './labels'

export class LotDraft {
  readonly columns = new GrowingColumns()
  readonly wafers = new WaferLabels()
  readonly sites = new SiteNames()
  /** The lot that the files name, and the file that named it first. */
  lot: { readonly name: string; readonly file: string } | null = null
  readonly mixed: FileProblem[] = []
  /** Each sentence once. */
  readonly notes = new Set<string>()

  /** Undoes everything since: what a file said that is then refused must not weigh on the others. */
  mark(): () => void {
    const { lot } = this
    const { count } = this.columns
    const mixed = this.mixed.length
    const notes = [...this.notes]
    const undoWafers = this.wafers.mark()
    return () => {
      this.columns.truncate(count)
      this.lot = lot
      this.mixed.length = mixed
      this.notes.clear()
      for (const note of notes) this.notes.add(note)
      undoWafers()
    }
  }

  nameLot(name: string, file: string): void {
    if (this.lot === null) this.lot = { name, file }
    else if (this.lot.name !== name && !this.mixed.some((problem) => problem.file === file)) {
      this.mixed.push({
        kind: 'mixed-files',
        file,
        what: 'lot',
        first: `${this.lot.name} (${this.lot.file})`,
        found: name,
      })
    }
  }
}
