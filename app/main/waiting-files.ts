import type { OpenedFile } from '../contract/host'

/** Paths that the system asked the program to open, until the window fetches them: each is handed out once. */
export class WaitingFiles {
  private paths: readonly string[] = []
  private readonly tell: () => void

  /** @param tell  is called when there is something new */
  constructor(tell: () => void) {
    this.tell = tell
  }

  add(paths: readonly string[]): void {
    if (paths.length === 0) return
    this.paths = [...this.paths, ...paths]
    this.tell()
  }

  /** A file that can't be read is not asked for again: it would stand in the way of every later one. */
  take(open: (paths: readonly string[]) => Promise<readonly OpenedFile[]>): Promise<readonly OpenedFile[]> {
    const { paths } = this
    this.paths = []
    return open(paths)
  }
}
