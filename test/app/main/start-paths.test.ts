import { resolve } from 'node:path'
import { expect, it } from 'vitest'
import { startPaths } from '../../../app/main/start-paths'

it.each([
  [['electron', '.', 'a.csv', '--inspect', 'b.json'], false, ['a.csv', 'b.json']],
  [['electron', '.', '--', '-odd.csv', 'a.csv'], false, ['-odd.csv', 'a.csv']],
  [['electron', '--inspect=0', '.', 'a.csv'], false, ['a.csv']],
  [['persquare', '--no-sandbox', 'a.csv'], true, ['a.csv']],
  [['electron', '.'], false, []],
])('%j (packaged: %s) names %j', (argv, isPackaged, paths) => {
  expect(startPaths(argv, isPackaged)).toEqual(paths.map((path) => resolve(path)))
})
