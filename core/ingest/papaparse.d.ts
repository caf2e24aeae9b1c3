/**
 * The one part of Papa Parse that is used, typed here: its published types bring in Node's, and core must not see
 * those. The file is named in the import for the same reason.
 */
declare module 'papaparse/papaparse.js' {
  interface ParseOptions {
    readonly delimiter: string
    readonly newline: '\n'
    readonly fastMode: boolean
  }
  interface ParseError {
    readonly type: 'Quotes' | 'Delimiter' | 'FieldMismatch'
    readonly code: string
    readonly row?: number
  }
  const Papa: {
    readonly Parser: new (options: ParseOptions) => {
      parse(text: string): { readonly data: string[][]; readonly errors: readonly ParseError[] }
    }
  }
  export default Papa
}
