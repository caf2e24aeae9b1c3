/** From files to the analysis of a lot: the one place where the window calls core's pipeline. Loaded when first needed. */
import type { RunResult } from '../../core/analysis/run'
import type { OpenedFile } from '../contract/host'

export async function analyzeFiles(readings: readonly OpenedFile[], procedure: OpenedFile): Promise<RunResult> {
  const { run } = await import('../../core/analysis/run')
  return run({ readings: await Promise.all(readings.map(withDigest)), procedure })
}

async function withDigest({ name, bytes }: OpenedFile): Promise<{ name: string; bytes: Uint8Array; sha256: string }> {
  const digest = new Uint8Array(await crypto.subtle.digest('SHA-256', new Uint8Array(bytes)))
  return { name, bytes, sha256: Array.from(digest, (byte) => byte.toString(16).padStart(2, '0')).join('') }
}
