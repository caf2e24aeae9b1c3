import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { persquare } from './command'

describe('persquare formulas', () => {
  it('prints the appendix that is in the repository', () => {
    const { status, stdout } = persquare('formulas')
    expect(status).toBe(0)
    expect(stdout).toBe(readFileSync(join(import.meta.dirname, '../../../build/formulas.md'), 'utf8'))
  })

  it('prints those that have a word, and says so where none has', () => {
    expect(persquare('formulas', 'Klaassen').stdout).toMatch(/## Silicon\n\n### Mobility: Klaassen/)
    expect(persquare('formulas', 'Klaassen').stdout).not.toContain('Masetti')
    expect(persquare('formulas', 'phlogiston')).toMatchObject({ status: 2, stdout: '' })
    expect(persquare('formulas', 'a', 'b').status).toBe(2)
  })
})
