/** What the person opened before, newest first. The window knows tokens and names; the paths stay here. */
import { createHash } from 'node:crypto'
import { readFile, stat } from 'node:fs/promises'
import { basename, dirname, isAbsolute } from 'node:path'
import { CoreError } from '../../core/problems/problem'
import { isProcedureName } from '../contract/file-kinds'
import type { RecentEntry } from '../contract/host'
import { writeWhole } from '../host/write-whole'

const FORMAT = 'persquare-recent/1'
const MOST_OF_A_KIND = 10

interface Entry {
  readonly kind: RecentEntry['kind']
  readonly paths: readonly string[]
  readonly opened: string
}

export class RecentFiles {
  private readonly path: string
  private readonly now: () => Date
  private entries: readonly Entry[] | null = null
  private tail: Promise<unknown> = Promise.resolve()

  constructor(path: string, now: () => Date = () => new Date()) {
    this.path = path
    this.now = now
  }

  async list(): Promise<readonly RecentEntry[]> {
    return (await this.known()).map(({ kind, paths, opened }) => {
      return { token: tokenOf(paths), kind, names: paths.map((path) => basename(path)), opened }
    })
  }

  /** @throws CoreError bad-argument where nothing of this token was ever opened */
  async pathsOf(token: string): Promise<readonly string[]> {
    const entry = (await this.known()).find(({ paths }) => tokenOf(paths) === token)
    if (entry) return entry.paths
    throw new CoreError({ kind: 'bad-argument', argument: 'the recent file', why: 'it is not in the list any more' })
  }

  /** @returns whether there was anything to remember; a list that can't be written is no reason to fail */
  async remember(paths: readonly string[]): Promise<boolean> {
    const files: string[] = []
    for (const path of paths) if (isAbsolute(path) && (await isFile(path))) files.push(path)
    if (files.length === 0) return false
    const opened = this.now().toISOString()
    const ofKind = (kind: Entry['kind']): Entry[] => {
      const own = files.filter((path) => isProcedureName(path) === (kind === 'procedure'))
      return own.length > 0 ? [{ kind, paths: own, opened }] : []
    }
    const added = [...ofKind('readings'), ...ofKind('procedure')]
    const tokens = new Set(added.map((entry) => tokenOf(entry.paths)))
    const others = (await this.known()).filter((entry) => !tokens.has(tokenOf(entry.paths)))
    await this.write(fewest([...added, ...others]))
    return true
  }

  forget(): Promise<void> {
    return this.write([])
  }

  private async known(): Promise<readonly Entry[]> {
    return (this.entries ??= await readFile(this.path, 'utf8').then(parsed, () => []))
  }

  private async write(entries: readonly Entry[]): Promise<void> {
    this.entries = entries
    const text = `${JSON.stringify({ format: FORMAT, entries }, null, 2)}\n`
    const save = () => writeWhole(dirname(this.path), new Map([[basename(this.path), text]]))
    await (this.tail = this.tail.then(save).catch(() => undefined))
  }
}

function fewest(entries: readonly Entry[]): readonly Entry[] {
  const ofKind = (kind: Entry['kind']) => entries.filter((entry) => entry.kind === kind).slice(0, MOST_OF_A_KIND)
  const kept = new Set([...ofKind('readings'), ...ofKind('procedure')])
  return entries.filter((entry) => kept.has(entry))
}

/** Tells nothing of the paths, and stays the same from one start to the next. */
function tokenOf(paths: readonly string[]): string {
  return createHash('sha256').update(paths.join('\0')).digest('hex').slice(0, 32)
}

async function isFile(path: string): Promise<boolean> {
  return (await stat(path).catch(() => null))?.isFile() ?? false
}

/** A list that was damaged, or written by another edition, is an empty one. */
function parsed(text: string): readonly Entry[] {
  try {
    const { format, entries } = JSON.parse(text) as { format?: unknown; entries?: unknown }
    return format === FORMAT && Array.isArray(entries) ? entries.filter(isEntry) : []
  } catch {
    return []
  }
}

function isEntry(value: unknown): value is Entry {
  if (typeof value !== 'object' || value === null) return false
  const { kind, paths, opened } = value as Record<string, unknown>
  if (!Array.isArray(paths) || paths.length === 0) return false
  const areAbsolute = paths.every((path) => typeof path === 'string' && isAbsolute(path))
  return areAbsolute && (kind === 'readings' || kind === 'procedure') && typeof opened === 'string'
}
