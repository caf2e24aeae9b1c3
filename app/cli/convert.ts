/** `persquare convert`: one value at a time, with its working. */
import { convert } from '../../core/conversion/convert'
import { temperatureModels } from '../../core/conversion/over-temperature'
import { DOPANTS } from '../../core/silicon/dopants'
import { mobilityIds } from '../../core/silicon/mobility/registry'
import { conversionJson, conversionText } from './convert-output'
import { convertOptions } from './convert-query'

export const CONVERT_USAGE = `usage: persquare convert (one value) [options]

  --v-over-i OHM            voltage over current, configuration A
  --sheet-resistance OHM_SQ
  --resistivity OHM_CM
  --concentration CM3       of the dopant; 0 is intrinsic silicon
  --resistance OHM          wanted of a resistor of --length-um, --width-um, --thickness-um

  --thickness-um UM         of what conducts, the wafer or the layer; V/I then takes the thickness factor
  --dopant NAME             ${DOPANTS.join(', ')}; without it the way ends at resistivity
  --mobility MODEL          ${mobilityIds.join(', ')} (default: masetti)
  --electron-mobility MU    with --hole-mobility MU, in cm2/(V s): the model constant
  --intrinsic-density CM3   in place of the published one
  --temperature-c C         of the value and all that follows (default: 23)
  --temperatures LO,HI,STEP a table of the same piece, in degrees Celsius (${temperatureModels.map(({ id }) => id).join(', ')})
  --length-um, --width-um   of a resistor, whose resistance is then given
  --diameter-mm MM          of the wafer that V/I was taken on, with --spacing-mm MM of the pins, --x-mm, --y-mm of
                            their middle, --angle-deg of the pin line; without it the sheet is infinite
  --back KIND               insulating or conducting (default: insulating)
  --json                    print one object instead of the calculation

exit status: 0 converted; 2 not converted`

export async function convertCommand(args: readonly string[]): Promise<number> {
  process.stdout.write(converted(args))
  return 0
}

/** What is printed. @throws CoreError bad-argument, out-of-range, not-applicable */
export function converted(args: readonly string[]): string {
  const { query, output } = convertOptions(args)
  const conversion = convert(query)
  const isResistor = query.resistor !== undefined
  return output === 'json' ? conversionJson(conversion, { isResistor }) : conversionText(conversion)
}
