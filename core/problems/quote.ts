const LONGEST = 60

/** Text of a file inside a sentence: in quotes, cut at 60 characters, control characters and invisible ones escaped. */
export function quote(text: string): string {
  const characters = [...text]
  const cut = characters.length > LONGEST ? `${characters.slice(0, LONGEST - 1).join('')}…` : text
  return `"${cut.replace(/[\p{Cc}\p{Cf}\p{Zl}\p{Zp}\p{Cs}]/gu, escaped)}"`
}

const NAMED: Readonly<Record<string, string>> = { '\t': '\\t', '\n': '\\n', '\r': '\\r' }

function escaped(character: string): string {
  const code = character.codePointAt(0)!.toString(16)
  return NAMED[character] ?? (code.length > 4 ? `\\u{${code}}` : `\\u${code.padStart(4, '0')}`)
}

/** `"a", "b" and 3 more`: long lists are cut. */
export function quotedList(words: readonly string[], most = 12): string {
  if (words.length === 0) return 'none'
  const shown = words.slice(0, most).map(quote)
  const rest = words.length - shown.length
  if (rest > 0) return `${shown.join(', ')} and ${rest} more`
  return shown.length === 1 ? shown[0] : `${shown.slice(0, -1).join(', ')} and ${shown[shown.length - 1]}`
}
