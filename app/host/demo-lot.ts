import { join } from 'node:path'

const NAMES = ['TB-0417.csv', 'TB-0417.procedure.json']

/** Where the bundled lot lies in the program's folder, packaged or not. */
export function demoPaths(root: string): readonly string[] {
  return NAMES.map((name) => join(root, 'sample-data', name))
}
