import { describe, expect, it } from 'vitest'
import { persquare } from './command'

describe.each(['analyze', 'verify', 'convert', 'gauge', 'check', 'uncertainty', 'sites'])('persquare %s', (command) => {
  it('refuses an option that there is none of, by its name, and says where the options stand', () => {
    const { status, stdout, stderr } = persquare(command, '--nonsense')
    expect([status, stdout]).toEqual([2, ''])
    expect(stderr).toBe(`persquare: The argument "--nonsense" can't be used: there is no such option; --help after the command lists them.\n`)
  })
}) // prettier-ignore

it.each(['convert', 'sites'])('persquare %s refuses a file, as it takes options alone', (command) => {
  const { status, stderr } = persquare(command, 'a.csv')
  expect(status).toBe(2)
  expect(stderr).toMatch(/"a.csv" can't be used: the command takes options alone/)
})

it.each([['gauge', '--probe'], ['check', '--width'], ['analyze', '--out']])('persquare %s %s asks for the value', (command, option) => {
  const { status, stderr } = persquare(command, 'a.csv', option)
  expect(status).toBe(2)
  expect(stderr).toMatch(new RegExp(`"${option}" can't be used: it needs a value after it`))
}) // prettier-ignore
