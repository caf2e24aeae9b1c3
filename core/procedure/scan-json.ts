/**
 * Where a JSON text goes wrong, in words of our own: the engine's own message differs between engines and versions,
 * and the same bytes must give the same answer everywhere. It also finds keys written twice, which JSON.parse
 * settles in silence.
 */
export interface JsonScan {
  readonly fault: JsonFault | null
  /** Dotted paths of keys that stand twice in one object. */
  readonly doubledKeys: readonly string[]
}

export interface JsonFault {
  /** 1-based. */
  readonly line: number
  readonly column: number
  readonly why: string
}

/** Far deeper than any procedure; keeps every later walk over the value off the end of the stack. */
const MAX_DEPTH = 64

class Fault extends Error {
  constructor(
    readonly offset: number,
    readonly why: string,
  ) {
    super(why)
  }
}

export function scanJson(text: string): JsonScan {
  const scanner = new Scanner(text)
  try {
    scanner.document()
  } catch (error) {
    if (!(error instanceof Fault)) throw error
    return { fault: { ...placeAt(text, error.offset), why: error.why }, doubledKeys: [] }
  }
  return { fault: null, doubledKeys: scanner.doubledKeys }
}

function placeAt(text: string, offset: number): { line: number; column: number } {
  const lines = text.slice(0, offset).split(/\r\n|\r|\n/)
  return { line: lines.length, column: lines[lines.length - 1].length + 1 }
}

class Scanner {
  readonly doubledKeys: string[] = []
  private at = 0

  constructor(private readonly text: string) {}

  document(): void {
    this.space()
    if (this.at === this.text.length) throw new Fault(this.at, 'the file is empty')
    this.value('', 0)
    if (this.at < this.text.length) {
      throw new Fault(this.at, `${shown(this.text[this.at])} stands after the end of the object`)
    }
  }

  /** One value and the white space after it. */
  private value(path: string, depth: number): void {
    if (depth > MAX_DEPTH) throw new Fault(this.at, `it is nested deeper than ${MAX_DEPTH} levels`)
    const first = this.text[this.at]
    if (first === undefined) throw new Fault(this.at, 'it breaks off where a value is expected')
    if (first === '{') this.object(path, depth)
    else if (first === '[') this.list(path, depth)
    else if (first === '"') this.string()
    else if ('-+.'.includes(first) || isDigit(first)) this.number()
    else this.word(first)
    this.space()
  }

  private object(path: string, depth: number): void {
    this.step()
    if (this.skip('}')) return
    const keys = new Set<string>()
    do {
      const before = this.at
      if (this.text[before] === '}') throw new Fault(before, 'a comma stands before the closing }')
      if (this.text[before] !== '"') throw new Fault(before, this.endedOr(keyExpected(this.text[before])))
      const key = this.string()
      this.space()
      const here = path === '' ? key : `${path}.${key}`
      if (keys.has(key)) this.doubledKeys.push(here)
      keys.add(key)
      if (!this.skip(':')) throw new Fault(this.at, this.endedOr('a colon is missing after the key'))
      this.value(here, depth + 1)
    } while (this.skip(','))
    if (this.text[this.at] !== '}') throw new Fault(this.at, this.endedOr('a comma or a closing } is missing'))
    this.at += 1
  }

  private list(path: string, depth: number): void {
    this.step()
    if (this.skip(']')) return
    let index = 0
    do {
      if (this.text[this.at] === ']') throw new Fault(this.at, 'a comma stands before the closing ]')
      this.value(`${path}[${index}]`, depth + 1)
      index += 1
    } while (this.skip(','))
    if (this.text[this.at] !== ']') throw new Fault(this.at, this.endedOr('a comma or a closing ] is missing'))
    this.at += 1
  }

  private string(): string {
    const start = this.at
    this.at += 1
    for (;;) {
      const next = this.text[this.at]
      if (next === undefined) throw new Fault(start, 'the closing double quote of this text is missing')
      if (next === '"') break
      if (next < ' ')
        throw new Fault(this.at, 'a text in quotes may not hold a line break, a tab or another control character')
      if (next === '\\') this.escape()
      else this.at += 1
    }
    this.at += 1
    return JSON.parse(this.text.slice(start, this.at)) as string
  }

  private escape(): void {
    const found = /^\\(?:["\\/bfnrt]|u[0-9a-fA-F]{4})/.exec(this.text.slice(this.at, this.at + 6))
    if (found === null) throw new Fault(this.at, 'a backslash in a text must be written twice')
    this.at += found[0].length
  }

  private number(): void {
    const start = this.at
    const written = this.run(/[-+.\w]+/y)
    if (!/^-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][-+]?\d+)?$/.test(written)) {
      throw new Fault(start, `${shown(written)} is no number as JSON writes it (such as 0.35, -2 or 1e15)`)
    }
    this.at += written.length
  }

  private word(first: string): void {
    const word = this.run(/[\w$]*/y)
    if (word !== 'true' && word !== 'false' && word !== 'null') throw new Fault(this.at, unexpected(first, word))
    this.at += word.length
  }

  /** What the pattern, a sticky one, finds from here on. */
  private run(pattern: RegExp): string {
    pattern.lastIndex = this.at
    return pattern.exec(this.text)?.[0] ?? ''
  }

  private step(): void {
    this.at += 1
    this.space()
  }

  private skip(sign: string): boolean {
    if (this.text[this.at] !== sign) return false
    this.step()
    return true
  }

  private space(): void {
    while (' \t\n\r'.includes(this.text[this.at] ?? 'x')) this.at += 1
  }

  private endedOr(why: string): string {
    return this.at >= this.text.length ? 'it breaks off before the closing bracket' : why
  }
}

function unexpected(first: string, word: string): string {
  if (first === "'") return 'a text must stand in double quotes'
  if (first === '/' || first === '#') return 'JSON has no comments'
  if (first === ',' || first === '}' || first === ']' || first === ':') return 'a value is missing here'
  return `${shown(word === '' ? first : word)} is no value; a text must stand in double quotes`
}

function keyExpected(found: string | undefined): string {
  const hint = found !== undefined && isDigit(found) ? '; decimals are written with a point' : ''
  return `a key in double quotes is expected here${hint}`
}

function isDigit(sign: string): boolean {
  return sign >= '0' && sign <= '9'
}

function shown(text: string): string {
  return JSON.stringify(text.length > 30 ? `${text.slice(0, 29)}…` : text)
}
