import { mkdir, mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { CONTENT_SECURITY_POLICY } from '../../../app/contract/page'
import { pageResponder } from '../../../app/main/page-protocol'

let folder: string
let respond: ReturnType<typeof pageResponder>
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'persquare-'))
  await mkdir(join(folder, 'page', 'assets'), { recursive: true })
  await writeFile(join(folder, 'page', 'index.html'), '<!doctype html>')
  await writeFile(join(folder, 'page', 'assets', 'main.js'), 'export {}')
  await writeFile(join(folder, 'secret.json'), '{}')
  respond = pageResponder(join(folder, 'page'))
})
afterAll(() => rm(folder, { recursive: true }))

it.each([
  ['app://persquare/', 'text/html; charset=utf-8', '<!doctype html>'],
  ['app://persquare/index.html', 'text/html; charset=utf-8', '<!doctype html>'],
  ['app://persquare/assets/main.js?v=1', 'text/javascript; charset=utf-8', 'export {}'],
])('serves %s under the security policy', async (url, contentType, body) => {
  const response = await respond({ method: 'GET', url })
  expect(response.status).toBe(200)
  expect(response.headers.get('content-type')).toBe(contentType)
  expect(response.headers.get('content-security-policy')).toBe(CONTENT_SECURITY_POLICY)
  expect(response.headers.get('x-content-type-options')).toBe('nosniff')
  expect(await response.text()).toBe(body)
})

it.each([
  ['GET', 'app://elsewhere/index.html'],
  ['POST', 'app://persquare/index.html'],
  ['GET', 'app://persquare/absent.html'],
  ['GET', 'app://persquare/assets'],
  ['GET', 'app://persquare/../secret.json'],
  ['GET', 'app://persquare/%2e%2e/secret.json'],
  ['GET', 'app://persquare/..%2fsecret.json'],
  ['GET', 'app://persquare/..\\secret.json'],
  ['GET', 'app://persquare//etc/hosts.json'],
])('has nothing for %s %s', async (method, url) => {
  const response = await respond({ method, url })
  expect(response.status).toBe(404)
  expect(await response.text()).toBe('')
})
