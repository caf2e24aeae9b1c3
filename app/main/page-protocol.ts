/** Serves the built page under a scheme of its own: a `file:` page has no origin that a security policy could name. */
import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { PAGE_HEADERS, pageFile } from '../contract/page'

export const PAGE_SCHEME = 'app'
const PAGE_HOST = 'persquare'
export const PAGE_ORIGIN = `${PAGE_SCHEME}://${PAGE_HOST}`
export const PAGE_URL = `${PAGE_ORIGIN}/index.html`

export function isPageUrl(url: string): boolean {
  return url.startsWith(`${PAGE_ORIGIN}/`)
}

/** Answers requests for the page's files from the folder `root`. */
export function pageResponder(root: string): (request: Pick<Request, 'method' | 'url'>) => Promise<Response> {
  return async ({ method, url }) => {
    const { host, pathname } = new URL(url)
    const file = host === PAGE_HOST && method === 'GET' ? pageFile(pathname) : null
    if (file === null) return refusal(404)
    try {
      const body = await readFile(join(root, file.path))
      return new Response(new Uint8Array(body), { headers: { ...PAGE_HEADERS, 'content-type': file.contentType } })
    } catch {
      return refusal(404)
    }
  }
}

function refusal(status: number): Response {
  return new Response(null, { status, headers: PAGE_HEADERS })
}
