import { ref } from 'vue'
import type { SaveKind } from '../../contract/file-kinds'
import { useHost } from '../host-key'
import { useLotStore } from '../stores/lot'

/** The last thing that was saved, for the line that says so. */
const said = ref('')

export function useSaving(): {
  save: (name: string, bytes: Uint8Array, kind: SaveKind) => Promise<boolean>
  said: typeof said
} {
  const host = useHost()
  const lot = useLotStore()
  /** True where the file is written. */
  async function save(name: string, bytes: Uint8Array, kind: SaveKind): Promise<boolean> {
    const reply = await host.saveFile(name, bytes, kind)
    if (!reply.ok) lot.refuse(reply.problem)
    else if (reply.value === 'saved') said.value = `${name} is saved.`
    return reply.ok && reply.value === 'saved'
  }
  return { save, said }
}
