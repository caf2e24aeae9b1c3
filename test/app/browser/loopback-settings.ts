import { join } from 'node:path'
import type { LoopbackSettings } from '../../../app/browser/loopback-host'
import { demoPaths } from '../../../app/host/demo-lot'

/** Of a host for one test: any port, the bundled lot, and a state of its own in `folder`. */
export function loopbackSettings(
  folder: string,
  { root, files = [] }: Pick<LoopbackSettings, 'root'> & Partial<Pick<LoopbackSettings, 'files'>>,
): LoopbackSettings {
  const demo = demoPaths(join(import.meta.dirname, '..', '..', '..'))
  const program = { program: 'Persquare', version: '9.8.7' }
  return { port: 0, root, files, demo, stateFolder: join(folder, 'state'), program }
}
