/** How the page asks the loopback host for the files that the program was started with: `files` lists them, `files/0` is the first. */
export const NAMED_FILES_PATH = 'files'

export interface NamedFile {
  readonly name: string
}
