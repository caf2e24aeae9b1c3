/** The native menus: made of the table of commands, and sending nothing but its words. */
import type { MenuItemConstructorOptions } from 'electron'
import { COMMAND_IDS, COMMANDS, type Command, type CommandId } from '../contract/commands'

type Item = MenuItemConstructorOptions

/** @param send  hands a command to the window */
export function menuTemplate(send: (command: CommandId) => void, platform: NodeJS.Platform): Item[] {
  const commandsOf = (menu: Command['menu']): Item[] => {
    return COMMAND_IDS.filter((id) => COMMANDS[id].menu === menu).flatMap((id) => {
      const { label, key, begins }: Command = COMMANDS[id]
      const item: Item = { id, label, click: () => send(id), ...(key !== null && { accelerator: key }) }
      return begins ? [separator, item] : [item]
    })
  }
  const isMac = platform === 'darwin'
  return [
    ...(isMac ? [{ role: 'appMenu' } as const] : []),
    { label: '&File', submenu: [...commandsOf('file'), ...(isMac ? [] : [separator, { role: 'quit' } as const])] },
    { label: '&Edit', submenu: withClipboard(commandsOf('edit')) },
    { label: '&Wafer', submenu: commandsOf('wafer') },
    { label: '&View', submenu: [...commandsOf('view'), separator, ...textSize] },
    { role: 'windowMenu' },
    { role: 'help', submenu: [...commandsOf('help'), ...(isMac ? [] : [separator, { role: 'about' } as const])] },
  ]
}

const separator: Item = { type: 'separator' }

/** Cut, copy and paste work on text alone and are the system's own; undo and redo are the window's. */
function withClipboard(commands: readonly Item[]): Item[] {
  const [undo, redo, ...others] = commands
  const clipboard = (['cut', 'copy', 'paste', 'selectAll'] as const).map((role): Item => ({ role }))
  return [undo, redo, separator, ...clipboard, ...others]
}

/** Of the whole window; the keys without Alt zoom the map. */
const textSize: readonly Item[] = [
  { label: 'Larger text', role: 'zoomIn', accelerator: 'CmdOrCtrl+Alt+=' },
  { label: 'Smaller text', role: 'zoomOut', accelerator: 'CmdOrCtrl+Alt+-' },
  { label: 'Usual text', role: 'resetZoom', accelerator: 'CmdOrCtrl+Alt+0' },
  separator,
  { role: 'togglefullscreen' },
]
