/** What each choice offers, for the file dialogs of both hosts. */
export const FILE_CHOICES = {
  readings: { title: 'Readings', extensions: ['csv', 'tsv', 'txt', 'dat'] },
  procedure: { title: 'Procedure', extensions: ['json'] },
  folder: { title: 'Folder of readings', extensions: ['csv', 'tsv'] },
} as const

export type FileChoice = keyof typeof FILE_CHOICES

/** What can be saved, for the dialogs and for the type of a download. */
export const SAVE_KINDS = {
  report: { title: 'PDF report', extension: 'pdf', contentType: 'application/pdf' },
  csv: { title: 'Table', extension: 'csv', contentType: 'text/csv' },
  json: { title: 'JSON', extension: 'json', contentType: 'application/json' },
  svg: { title: 'Vector picture', extension: 'svg', contentType: 'image/svg+xml' },
  png: { title: 'Picture', extension: 'png', contentType: 'image/png' },
} as const

export type SaveKind = keyof typeof SAVE_KINDS

/** Whether a file of a folder is taken for readings: by the ending of its name, hidden ones never. */
export function isReadingsName(name: string): boolean {
  const ending = /[^.]\.([A-Za-z]+)$/.exec(name)?.[1]?.toLowerCase() ?? ''
  return !name.startsWith('.') && (FILE_CHOICES.folder.extensions as readonly string[]).includes(ending)
}

/** What the person opened: a lone JSON file is a procedure, everything else readings. */
export function isProcedureName(name: string): boolean {
  return name.toLowerCase().endsWith('.json')
}
