/** Written in by the build, from package.json. */
declare const __VERSION__: string | undefined

export const PROGRAM = 'Persquare'
export const VERSION = typeof __VERSION__ === 'string' ? __VERSION__ : 'development'
