/// <reference types="vite/client" />
import type { Host } from '../contract/host'

declare global {
  interface Window {
    /** Put there by the preload; absent in a plain browser. */
    readonly host?: Host
  }
}
