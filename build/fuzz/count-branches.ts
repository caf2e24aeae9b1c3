/**
 * Makes a bundle count where it has been, for the guided fuzzer: each block, arm of a condition and case of a switch adds
 * one to its place in `globalThis.__branches`. Done by the compiler's own tree, so that no tool with a native part is needed.
 */
import ts from 'typescript'
import type { Plugin } from 'vite'

export function countBranches(): Plugin {
  return {
    name: 'count-branches',
    renderChunk(code) {
      const { text, count } = counted(code)
      return { code: `globalThis.__branches = new Uint8Array(${count});\nconst $n = globalThis.__branches;\n${text}`, map: null }
    },
  }
} // prettier-ignore

/** Code with the counters set in, and how many they are. */
export function counted(code: string): { readonly text: string; readonly count: number } {
  const file = ts.createSourceFile('bundle.js', code, ts.ScriptTarget.ES2022, true, ts.ScriptKind.JS)
  const insertions: { at: number; text: string }[] = []
  let count = 0
  const next = (): string => `$n[${count++}]++`
  const arm = (node: ts.Node): void => {
    insertions.push({ at: node.getStart(), text: `(${next()},` }, { at: node.getEnd(), text: ')' })
  }
  const visit = (node: ts.Node): void => {
    // A function whose body begins with a directive has none here: the bundle is a module.
    if (ts.isBlock(node)) insertions.push({ at: node.getStart() + 1, text: `${next()};` })
    else if (ts.isCaseOrDefaultClause(node) && node.statements.length > 0)
      insertions.push({ at: node.statements[0].getStart(), text: `${next()};` })
    else if (ts.isConditionalExpression(node)) [node.whenTrue, node.whenFalse].forEach(arm)
    else if (ts.isBinaryExpression(node) && /^(&&|\|\||\?\?)$/.test(node.operatorToken.getText())) arm(node.right)
    else if (ts.isIfStatement(node)) [node.thenStatement, node.elseStatement].forEach(branch)
    ts.forEachChild(node, visit)
  }
  const branch = (statement: ts.Statement | undefined): void => {
    if (!statement || ts.isBlock(statement)) return
    insertions.push({ at: statement.getStart(), text: `{${next()};` }, { at: statement.getEnd(), text: '}' })
  }
  visit(file)
  return { text: inserted(code, insertions), count }
}

/** At one place an end comes before a beginning; of several ends the inner one, of several beginnings the outer. */
function inserted(code: string, insertions: readonly { readonly at: number; readonly text: string }[]): string {
  const parts: string[] = []
  let from = 0
  const isEnd = (text: string): number => (text === ')' || text === '}' ? 0 : 1)
  const sorted = insertions.map((one, order) => ({ ...one, order }))
  sorted.sort((a, b) => a.at - b.at || isEnd(a.text) - isEnd(b.text) || (isEnd(a.text) ? a.order - b.order : b.order - a.order))
  for (const { at, text } of sorted) {
    parts.push(code.slice(from, at), text)
    from = at
  }
  return [...parts, code.slice(from)].join('')
} // prettier-ignore
