import { spawn } from 'node:child_process'

/** Asks the system for its browser. Where that fails the address stands on the terminal, so nothing more is said. */
export function openInBrowser(url: string): void {
  const [command, args] = browserCommand(process.platform, url)
  const child = spawn(command, args, { stdio: 'ignore', detached: true })
  child.on('error', () => undefined)
  child.unref()
}

/** No shell is involved, so the address needs no quoting. */
export function browserCommand(platform: NodeJS.Platform, url: string): readonly [string, string[]] {
  if (platform === 'darwin') return ['open', [url]]
  if (platform === 'win32') return ['rundll32', ['url.dll,FileProtocolHandler', url]]
  return ['xdg-open', [url]]
}
