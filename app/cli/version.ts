import { createRequire } from 'node:module'

export const PROGRAM = 'Persquare'
/** From package.json, the one place the version stands; the path holds from app/cli and from out/cli alike. */
export const VERSION = (createRequire(import.meta.url)('../../package.json') as { version: string }).version
