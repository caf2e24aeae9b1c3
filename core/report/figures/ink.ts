/** The few inks of the report's figures. Colour belongs to the data; these are for everything else. */
export const INK = '#1c1b19'
export const QUIET_INK = '#6b6862'
export const RULE = '#b9b5ac'
export const FAINT = '#e6e3dc'
export const PAPER = '#ffffff'
/** What is out of spec, beside its shape; told from the value colours by their lack of red. */
export const ALERT = '#b3261e'

export const LABEL_PT = 6.5
export const AXIS_PT = 7
