import type { Host } from './host'

/** Calls of `Host` that are answered; those that call back have channels of their own below. */
export type HostCall = {
  readonly [Name in keyof Host]: Host[Name] extends (...args: never[]) => Promise<unknown> ? Name : never
}[keyof Host]

/** The channel of each call; a call added to `Host` doesn't compile until it has one here, in main and in the preload. */
export const CHANNELS = {
  chooseFiles: 'persquare:choose-files',
  startFiles: 'persquare:start-files',
  demoFiles: 'persquare:demo-files',
  rememberDropped: 'persquare:remember-dropped',
  recentFiles: 'persquare:recent-files',
  reopen: 'persquare:reopen',
  forgetRecent: 'persquare:forget-recent',
  saveFile: 'persquare:save-file',
  makeReport: 'persquare:make-report',
  printReport: 'persquare:print-report',
  loadState: 'persquare:load-state',
  saveState: 'persquare:save-state',
  keepFile: 'persquare:keep-file',
  keptFile: 'persquare:kept-file',
} as const satisfies Record<HostCall, string>

/** What main tells the window of its own accord. */
export const EVENTS = { command: 'persquare:command', filesWaiting: 'persquare:files-waiting' } as const
