/** Names of lots, wafers, sites and operators as nobody would give them. */

/** Would run, each in its own way, where text is taken for markup. */
export const MARKUP = [
  '<img src=x onerror=window.__ran=1>',
  '<script>window.__ran=1</script>',
  '"><svg onload=window.__ran=1>',
  "x'-alert(1)-'",
  '</text></svg><script>window.__ran=1</script>',
  '{{constructor.constructor("window.__ran=1")()}}',
  '<a href="javascript:window.__ran=1">W</a>',
  ']]><!--<b>',
  '&lt;b&gt;',
] as const

export const FORMULAS = [
  '=1+1',
  '+1+1',
  '-1+1',
  '@SUM(A1:A9)',
  '=HYPERLINK("http://evil.example","x")',
  "=cmd|' /C calc'!A0",
  "'=1",
  "''=1",
  '＝1+1',
  '＋1',
  '－1',
  '＠SUM(A1)',
] as const

export const PATHS = ['../../etc/passwd', '..\\..\\windows\\win.ini', '/etc/passwd', 'C:\\x', '....//x', 'CON', '.bashrc', 'a\u0000b', '~/x', '%2e%2e%2fx', '-rf'] as const // prettier-ignore

/** Found in every object of the language, or changing it where they are set. */
export const PROPERTIES = ['__proto__', 'constructor', 'prototype', 'toString', 'hasOwnProperty', 'valueOf'] as const

const cell = (text: string): string => `"${text.replace(/"/g, '""')}"`

/** An export with these names: the first wafer's sites have them all, and each is a wafer with one site more. */
export function exportOf(names: readonly string[], lot: string, operator: string): string {
  const row = (wafer: string, site: string, at: number) =>
    [cell(wafer), cell(site), (at % 9) * 10 - 40, Math.floor(at / 9) * 10 - 40, '5e-4', 0.0101 + at * 1e-6].join(',')
  return [
    cell(`Lot: ${lot}`),
    cell(`Operator: ${operator}`),
    'wafer,site,x_mm,y_mm,current_A,voltage_V',
    ...names.map((name, at) => row(names[0], name, at)),
    ...names.slice(1).map((name, at) => row(name, name, at)),
    '',
  ].join('\n')
}
