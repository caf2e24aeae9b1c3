import { inject } from 'vue'
import type { InjectionKey } from 'vue'
import type { Host } from '../contract/host'

export const hostKey: InjectionKey<Host> = Symbol('host')

/** The machine the page runs on; only `main.ts` knows which it is. */
export function useHost(): Host {
  const host = inject(hostKey)
  if (!host) throw new Error('the page was mounted without a host')
  return host
}
