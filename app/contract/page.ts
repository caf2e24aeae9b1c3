/** What both hosts agree on about the page they serve. */

/**
 * Scripts, styles, fonts and workers come from the page's own origin alone and nothing is evaluated from text. The
 * figures set style attributes and add one empty style element (its hash is that of the empty text).
 */
export const CONTENT_SECURITY_POLICY = [
  "default-src 'none'",
  "script-src 'self'",
  "style-src-elem 'self' 'sha256-47DEQpj8HBSa+/TImW+5JCeuQeRkm5NMpJWZG3hSuFU='",
  "style-src-attr 'unsafe-inline'",
  "img-src 'self' data: blob:",
  "font-src 'self'",
  "connect-src 'self'",
  "worker-src 'self'",
  "base-uri 'none'",
  "form-action 'none'",
  "frame-ancestors 'none'",
].join('; ')

export const PAGE_HEADERS: Readonly<Record<string, string>> = {
  'content-security-policy': CONTENT_SECURITY_POLICY,
  'cross-origin-opener-policy': 'same-origin',
  'cross-origin-resource-policy': 'same-origin',
  'referrer-policy': 'no-referrer',
  'x-content-type-options': 'nosniff',
}

const CONTENT_TYPES: Readonly<Record<string, string>> = {
  css: 'text/css; charset=utf-8',
  csv: 'text/csv; charset=utf-8',
  html: 'text/html; charset=utf-8',
  js: 'text/javascript; charset=utf-8',
  json: 'application/json; charset=utf-8',
  png: 'image/png',
  svg: 'image/svg+xml',
  ttf: 'font/ttf',
  woff2: 'font/woff2',
}

export interface PageFile {
  /** Relative to the folder of the built page, with `/`. */
  readonly path: string
  readonly contentType: string
}

/**
 * The file of the built page that a path names, or null: plain names only, so nothing hidden, nothing above the folder,
 * nothing percent-encoded, and only kinds of file that the page is made of.
 */
export function pageFile(pathname: string): PageFile | null {
  const path = pathname.replace(/^\//, '') || 'index.html'
  if (!path.split('/').every((part) => /^[A-Za-z0-9_-][A-Za-z0-9._-]*$/.test(part))) return null
  const contentType = CONTENT_TYPES[/\.([a-z0-9]+)$/.exec(path)?.[1] ?? '']
  return contentType === undefined ? null : { path, contentType }
}
