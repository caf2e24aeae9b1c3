/** What may cross between the window and its host, checked at run time where it arrives. The preload passes it on unseen. */
import * as z from 'zod/mini'
import { explain } from '../../core/problems/explain'
import type { Problem } from '../../core/problems/problem'
import { DECISIONS } from '../../core/report/decision'
import type { HostCall } from './channels'
import { FILE_CHOICES, SAVE_KINDS, type FileChoice } from './file-kinds'
import type { Host, Reply, ReportRequest, SavedState } from './host'

export const text = (most: number) => z.string().check(z.maxLength(most))
export const list = <Item extends z.core.$ZodType>(item: Item, most: number) => z.array(item).check(z.maxLength(most))
export const keysOf = <Key extends string>(record: Readonly<Record<Key, unknown>>) =>
  z.enum(Object.keys(record) as [Key, ...Key[]])

const bytes = z.custom<Uint8Array>((value) => value instanceof Uint8Array)
export const fileName = text(1000)
export const token = text(200)
const openedFile = z.object({ name: fileName, bytes })
const openedFiles = list(openedFile, 10_000)

export const exclusion = z.object({ wafer: text(1000), site: text(1000), reason: text(2000) })
const decision = z.object({ decision: keysOf(DECISIONS), name: text(200), comment: text(5000), date: text(100) })

/** All of a report request but the bytes of its files. */
export const reportTerms = z.object({
  excluded: list(exclusion, 5000),
  decision: z.nullable(decision),
  date: z.nullable(text(100)),
  paper: z.enum(['A4', 'Letter']),
})

/** The same over HTTP, where the files follow: their names in the order of the bytes. */
export const reportHead = z.extend(reportTerms, { readings: list(fileName, 10_000), procedure: fileName })

const reportRequest: z.ZodMiniType<ReportRequest> = z.extend(reportTerms, {
  readings: openedFiles,
  procedure: openedFile,
})

const savedState: z.ZodMiniType<SavedState> = z.object({
  text: z.string(),
  generation: z.enum(['last', 'previous']),
})

const recentEntry = z.object({
  token,
  kind: z.enum(['readings', 'procedure']),
  names: list(fileName, 10_000),
  opened: text(100),
})

/** The arguments of a call as they reach the host: of dropped files the paths, which the preload takes from them. */
export type HostArguments<Name extends HostCall> = Name extends 'rememberDropped'
  ? [paths: readonly string[]]
  : Parameters<Host[Name]>

type Arguments = { readonly [Name in HostCall]: z.ZodMiniType<HostArguments<Name>> }
type Values = { readonly [Name in HostCall]: z.ZodMiniType<ValueOf<Name>> }

/** What a call gives where nothing is in its way. */
export type ValueOf<Name extends HostCall> = Awaited<ReturnType<Host[Name]>> extends Reply<infer Value> ? Value : never

const nothing = z.tuple([])

export const ARGUMENTS: Arguments = {
  chooseFiles: z.tuple([keysOf<FileChoice>(FILE_CHOICES)]),
  startFiles: nothing,
  demoFiles: nothing,
  rememberDropped: z.tuple([list(z.string().check(z.minLength(1), z.maxLength(32_768)), 10_000)]),
  recentFiles: nothing,
  reopen: z.tuple([token]),
  forgetRecent: nothing,
  saveFile: z.tuple([fileName, bytes, keysOf(SAVE_KINDS)]),
  makeReport: z.tuple([reportRequest]),
  printReport: z.tuple([bytes]),
  loadState: nothing,
  saveState: z.tuple([z.string(), list(token, 1000)]),
  keepFile: z.tuple([bytes]),
  keptFile: z.tuple([token]),
}

const VALUES: Values = {
  chooseFiles: openedFiles,
  startFiles: openedFiles,
  demoFiles: openedFiles,
  rememberDropped: z.enum(['remembered', 'ignored']),
  recentFiles: list(recentEntry, 1000),
  reopen: openedFiles,
  forgetRecent: z.literal('forgotten'),
  saveFile: z.enum(['saved', 'cancelled']),
  makeReport: bytes,
  printReport: z.literal('opened'),
  loadState: z.nullable(savedState),
  saveState: z.literal('saved'),
  keepFile: token,
  keptFile: bytes,
}

/** A problem is what can be explained: whatever else has its shape would only fail when it is shown. */
export const problem = z.custom<Problem>((value) => {
  try {
    const problem = value as Problem
    // `toString` and its like are in every object, the table of sentences included.
    return !(problem.kind in {}) && typeof explain(problem) === 'string'
  } catch {
    return false
  }
})

export const REPLIES = Object.fromEntries(
  Object.entries(VALUES).map(([name, value]) => [
    name,
    z.discriminatedUnion('ok', [z.object({ ok: z.literal(true), value }), z.object({ ok: z.literal(false), problem })]),
  ]),
) as unknown as { readonly [Name in HostCall]: z.ZodMiniType<Awaited<ReturnType<Host[Name]>>> }
