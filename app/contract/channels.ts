import type { Host } from './host'

export type HostCall = {
  readonly [Name in keyof Host]: Host[Name] extends (...args: never[]) => unknown ? Name : never
}[keyof Host]

/** The channel of each call; a call added to `Host` doesn't compile until it has one here, in main and in the preload. */
export const CHANNELS = {
  chooseFiles: 'persquare:choose-files',
  startFiles: 'persquare:start-files',
  saveFile: 'persquare:save-file',
} as const satisfies Record<HostCall, string>
