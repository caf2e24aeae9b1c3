/** As much of jsdom as is used here. */
declare module 'jsdom' {
  export class JSDOM {
    constructor(text: string, options: { readonly contentType: string })
    readonly window: { readonly document: Document }
  }
}
