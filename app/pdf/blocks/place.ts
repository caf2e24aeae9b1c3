/** Where on the paper a block goes; the cursor says how far down. */
export interface Place {
  readonly x: number
  readonly width: number
}
