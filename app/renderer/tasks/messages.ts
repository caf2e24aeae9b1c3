/** What the window and its task worker say to each other. */
import type { TaskName } from './register'

export interface TaskOrder {
  readonly name: TaskName
  readonly input: unknown
}

export type TaskReport =
  | { readonly kind: 'share'; readonly share: number }
  | { readonly kind: 'done'; readonly output: unknown }
  | { readonly kind: 'failed'; readonly why: string }
