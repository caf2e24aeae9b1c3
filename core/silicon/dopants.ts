/** The dopants the models know, and the type each makes silicon. */
export const DOPANTS = ['boron', 'phosphorus', 'arsenic'] as const
export type Dopant = (typeof DOPANTS)[number]

export function isAcceptor(dopant: Dopant): boolean {
  return dopant === 'boron'
}
