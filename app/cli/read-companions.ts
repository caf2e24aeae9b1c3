import { existsSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { companionsNamedIn } from '../../core/analysis/companions'
import { readInput, type InputFile } from './read-inputs'

/**
 * The files that a procedure names, from beside it. The names have no folder in them: the procedure's format refuses
 * one that has. A file that isn't there is left out, and the analysis says so.
 *
 * @throws CoreError cannot-read: it is there and can't be read
 */
export async function readCompanions(procedurePath: string, procedure: InputFile): Promise<InputFile[]> {
  const paths = companionsNamedIn(procedure).map((name) => join(dirname(procedurePath), name))
  return Promise.all(paths.filter((path) => existsSync(path)).map(readInput))
}
