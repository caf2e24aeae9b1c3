import { homedir } from 'node:os'
import { isAbsolute, join } from 'node:path'

/**
 * Where a person's state is kept: PERSQUARE_STATE_DIR, else `persquare` under XDG_STATE_HOME, LOCALAPPDATA on Windows,
 * or ~/.local/state. A relative XDG_STATE_HOME counts as none, as its specification says.
 */
export function stateFolder(
  env: Readonly<Record<string, string | undefined>> = process.env,
  platform: NodeJS.Platform = process.platform,
): string {
  const own = env['PERSQUARE_STATE_DIR']
  if (own) return own
  const base = platform === 'win32' ? env['LOCALAPPDATA'] : env['XDG_STATE_HOME']
  return join(base && isAbsolute(base) ? base : join(homedir(), '.local', 'state'), 'persquare')
}
