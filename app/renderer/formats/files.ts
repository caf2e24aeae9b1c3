/** Files as bytes and back, and their sizes in words. */
import { formatFixed } from '../../../core/units/format'

export function textOf(bytes: Uint8Array): string {
  return new TextDecoder().decode(bytes)
}

export function bytesOf(text: string): Uint8Array {
  return new TextEncoder().encode(text)
}

/** As hexadecimal digits. */
export async function sha256(bytes: Uint8Array): Promise<string> {
  const digest = new Uint8Array(await crypto.subtle.digest('SHA-256', new Uint8Array(bytes)))
  return Array.from(digest, (byte) => byte.toString(16).padStart(2, '0')).join('')
}

export function sizeWords(bytes: number): string {
  if (bytes < 1000) return `${bytes} B`
  return bytes < 1e6 ? `${formatFixed(bytes / 1e3, 1)} kB` : `${formatFixed(bytes / 1e6, 1)} MB`
}

/** A lot's or wafer's name as part of a file name. */
export function fileStem(name: string): string {
  return name.replace(/[^A-Za-z0-9._-]+/g, '-').replace(/^[-.]+|-+$/g, '') || 'lot'
}
