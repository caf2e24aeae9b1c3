/**
 * What a person can command from a menu or the keyboard, in one table: the native menus are made of it, and the window's
 * own keys and help read it too. A key that the page has handled (and prevented) reaches no menu.
 */
export interface Command {
  readonly label: string
  readonly menu: 'file' | 'edit' | 'wafer' | 'view' | 'help'
  /** In the words of Electron's accelerators; `CmdOrCtrl` is Command on a Mac. null: no key of its own. */
  readonly key: string | null
  /** Begins a new group in its menu. */
  readonly begins?: true
}

export const COMMANDS = {
  'open-readings': { label: 'Open readings…', menu: 'file', key: 'CmdOrCtrl+O' },
  'open-folder': { label: 'Open folder…', menu: 'file', key: 'CmdOrCtrl+Shift+O' },
  'open-procedure': { label: 'Open procedure…', menu: 'file', key: 'CmdOrCtrl+Alt+O' },
  'open-demo': { label: 'Open the demo lot', menu: 'file', key: null },
  'save-report': { label: 'Save report…', menu: 'file', key: 'CmdOrCtrl+S', begins: true },
  'print-report': { label: 'Print report…', menu: 'file', key: 'CmdOrCtrl+P' },
  'close-lot': { label: 'Close lot', menu: 'file', key: 'CmdOrCtrl+W', begins: true },
  undo: { label: 'Undo', menu: 'edit', key: 'CmdOrCtrl+Z' },
  redo: { label: 'Redo', menu: 'edit', key: 'CmdOrCtrl+Shift+Z' },
  find: { label: 'Find…', menu: 'edit', key: 'CmdOrCtrl+F', begins: true },
  'previous-wafer': { label: 'Previous wafer', menu: 'wafer', key: 'PageUp' },
  'next-wafer': { label: 'Next wafer', menu: 'wafer', key: 'PageDown' },
  'next-out-of-spec': { label: 'Next site out of spec', menu: 'wafer', key: 'F8', begins: true },
  'previous-out-of-spec': { label: 'Previous site out of spec', menu: 'wafer', key: 'Shift+F8' },
  'zoom-in': { label: 'Zoom into the map', menu: 'view', key: 'CmdOrCtrl+=' },
  'zoom-out': { label: 'Zoom out of the map', menu: 'view', key: 'CmdOrCtrl+-' },
  'zoom-whole': { label: 'Whole wafer', menu: 'view', key: 'CmdOrCtrl+0' },
  'theme-system': { label: 'Colours as the system has them', menu: 'view', key: null, begins: true },
  'theme-light': { label: 'Light', menu: 'view', key: null },
  'theme-dark': { label: 'Dark', menu: 'view', key: null },
  'show-keys': { label: 'Keyboard', menu: 'help', key: 'F1' },
} as const satisfies Record<string, Command>

export type CommandId = keyof typeof COMMANDS

export const COMMAND_IDS = Object.keys(COMMANDS) as readonly CommandId[]

export function isCommandId(value: unknown): value is CommandId {
  return typeof value === 'string' && Object.hasOwn(COMMANDS, value)
}
