/** `persquare verify`: whether a report follows from the inputs inside it. */
import { stat } from 'node:fs/promises'
import { parseArgs } from 'node:util'
import { CoreError } from '../../core/problems/problem'
import { systemReason } from '../../core/problems/system-reason'
import { MAX_FILE_BYTES } from '../pdf/pdf-file'
import { verifyReport } from '../pdf/verify-report'
import { refuseAsNode } from './convert-arguments'
import { readInput, type InputFile } from './read-inputs'
import { verificationJson, verificationText } from './verify-output'
import { PROGRAM, VERSION } from './version'

export async function verifyCommand(args: readonly string[]): Promise<number> {
  const { path, json } = parse(args)
  const { name, bytes } = await readReport(path)
  const own = { program: PROGRAM, version: VERSION }
  const verification = await verifyReport(bytes, { file: name, ...own })
  process.stdout.write((json ? verificationJson : verificationText)(verification, { file: name, ...own }))
  return verification.isSame ? 0 : 1
}

/** Not read at all where it is no plain file, or larger than any report. */
async function readReport(path: string): Promise<InputFile> {
  const refuse = (why: string): never => {
    throw new CoreError({ kind: 'cannot-read', file: path, why })
  }
  const known = await stat(path).catch((error: unknown) => refuse(systemReason(error)))
  if (known.isDirectory()) refuse('it is a folder')
  if (!known.isFile()) refuse('it is no plain file')
  if (known.size > MAX_FILE_BYTES) refuse(`it is larger than ${MAX_FILE_BYTES / 2 ** 20} MB`)
  return readInput(path)
}

function parse(args: readonly string[]): { path: string; json: boolean } {
  const refuse = (argument: string, why: string): never => {
    throw new CoreError({ kind: 'bad-argument', argument, why })
  }
  try {
    const { values, positionals } = parseArgs({
      args: [...args],
      allowPositionals: true,
      options: { json: { type: 'boolean' } },
    })
    if (positionals.length === 0) refuse('REPORT.pdf', 'name a report that analyze has written')
    if (positionals.length > 1) refuse(positionals[1], 'one report is verified at a time')
    return { path: positionals[0], json: values.json ?? false }
  } catch (error) {
    if (error instanceof CoreError) throw error
    return refuseAsNode(error, args)
  }
}
