/**
 * Text cells on their way out and in. A spreadsheet takes a cell that begins with = + - @, their full-width forms, tab or a
 * line break for a formula (OWASP, CSV Injection). An apostrophe before it makes it plain text, and reading takes that
 * apostrophe off again. Text that already looks so guarded gets one more, so that the two undo each other always.
 */
const GUARDED = /^'*[=+\-@＝＋－＠\t\r\n]/
const TO_UNDO = /^'+[=+\-@＝＋－＠\t\r\n]/

export function guardTextCell(text: string): string {
  return GUARDED.test(text) ? `'${text}` : text
}

/** The text of a cell: without surrounding blanks, without the guard. */
export function readTextCell(cell: string): string {
  const text = cell.trim()
  return text.charCodeAt(0) === 39 && TO_UNDO.test(text) ? text.slice(1) : text
}
