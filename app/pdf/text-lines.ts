/** Text into lines of a given width. Numbers stay with their units; a word too long for a line is cut. */

/** Characters that can't be set, such as tabs and line ends in a name from a file, become spaces. */
export function plainText(text: string): string {
  return text.replace(/[\p{Cc}\p{Zl}\p{Zp}\p{Cs}]/gu, ' ')
}

const UNIT = /^(Ω|mΩ|kΩ|mm|µm|cm|nm|%|°C|K|V|mV|A|mA|µA|cm⁻³|cm⁻²|Ω\/sq|Ω·cm|UTC)[.,;:)]*$/
const JOINS_BOTH_SIDES = /^[×±]$/

export function wrapped(text: string, width: number, measure: (text: string) => number): string[] {
  const lines: string[] = []
  let line = ''
  for (const word of unbreakable(plainText(text))) {
    const longer = line === '' ? word : `${line} ${word}`
    if (measure(longer) <= width) {
      line = longer
      continue
    }
    if (line !== '') lines.push(line)
    const pieces = measure(word) <= width ? [word] : cut(word, width, measure)
    lines.push(...pieces.slice(0, -1))
    line = pieces[pieces.length - 1]
  }
  if (line !== '' || lines.length === 0) lines.push(line)
  return lines
}

/** Words, with those joined that must stand in one line: "12 mm", "1.43 × 10¹⁹ cm⁻³". */
function unbreakable(text: string): string[] {
  const words: string[] = []
  let joinNext = false
  for (const word of text.split(/ +/).filter((each) => each !== '')) {
    const last = words.length - 1
    const isUnit = UNIT.test(word) && last >= 0 && /[\d)⁰¹²³⁴-⁹]$/.test(words[last])
    const isSign = JOINS_BOTH_SIDES.test(word) && last >= 0
    if (last >= 0 && (isUnit || isSign || joinNext)) words[last] += ` ${word}`
    else words.push(word)
    joinNext = isSign
  }
  return words
}

/** A word in as many pieces as it takes; never fewer than one character a piece. */
function cut(word: string, width: number, measure: (text: string) => number): string[] {
  const pieces: string[] = []
  let piece = ''
  for (const character of word) {
    if (piece !== '' && measure(piece + character) > width) {
      pieces.push(piece)
      piece = ''
    }
    piece += character
  }
  return [...pieces, piece]
}
