/**
 * Sheet resistance times junction depth of doped layers over a junction [ohm um], computed by two quadratures in two
 * implementations that agree to 1.5e-14, each value to 1e-10. No published table: J. C. Irvin, Bell Syst. Tech. J. 41
 * (1962) 387 (citation from memory) prints curves with mobilities of his time, readable to 10 to 20 %.
 *
 * Definition: 1e4 / Integral_0^1 q mu(N + N_B) (N - N_B) d eta, N(1) = N_B, q = 1.602176634e-19 C. Mobility: G. Masetti,
 * M. Severi, S. Solmi, IEEE Trans. Electron Devices 30 (1983) 764 at 300 K, or that of SEMI MF723 at 23 C. The last
 * column takes the mobility at N alone, for comparison.
 */
import type { ProfileId } from '../../core/layer/layer-kind'
import type { Dopant } from '../../core/silicon/dopants'

export interface IrvinRow {
  readonly dopant: Dopant
  readonly profile: ProfileId
  readonly surface_cm3: number
  readonly background_cm3: number
  readonly mobility: 'masetti' | 'mf723'
  readonly product_ohm_um: number
  readonly productOfMobilityAtN_ohm_um: number
}

type Row = readonly [Dopant, ProfileId, number, number, 'masetti' | 'mf723', number, number]

const rows: readonly Row[] = [
  ['boron', 'gaussian', 1e17, 1e15, 'mf723', 4603.17647616, 4587.7916],
  ['boron', 'gaussian', 1e19, 1e15, 'mf723', 258.024198609, 257.98446],
  ['boron', 'erfc', 1e17, 1e15, 'mf723', 5962.27916863, 5939.8944],
  ['boron', 'erfc', 1e19, 1e15, 'mf723', 340.245374364, 340.17043],
  ['boron', 'exponential', 1e17, 1e15, 'masetti', 8403.87006024, 8373.1396],
  ['boron', 'exponential', 1e17, 1e15, 'mf723', 8426.69501588, 8391.4138],
  ['boron', 'exponential', 1e18, 1e16, 'masetti', 1397.99025066, 1383.611],
  ['boron', 'exponential', 1e18, 1e16, 'mf723', 1522.21607585, 1503.685],
  ['boron', 'exponential', 1e19, 1e15, 'mf723', 580.650137494, 580.42693],
  ['boron', 'exponential', 1e20, 1e16, 'masetti', 95.589263318, 95.537886],
  ['boron', 'exponential', 1e20, 1e16, 'mf723', 94.3029001367, 94.253116],
  ['boron', 'exponential', 1e21, 1e14, 'masetti', 26.8687560239, 26.868724],
  ['boron', 'uniform', 1e17, 1e15, 'masetti', 1979.54009469, 1975.7419],
  ['boron', 'uniform', 1e17, 1e15, 'mf723', 2046.91662415, 2041.9288],
  ['boron', 'uniform', 1e18, 1e16, 'masetti', 394.742288719, 393.26787],
  ['boron', 'uniform', 1e18, 1e16, 'mf723', 441.601882614, 439.94784],
  ['boron', 'uniform', 1e19, 1e15, 'mf723', 88.7292324925, 88.72738],
  ['boron', 'uniform', 1e20, 1e16, 'masetti', 12.5188369598, 12.518698],
  ['boron', 'uniform', 1e20, 1e16, 'mf723', 11.6900136443, 11.68995],
  ['boron', 'uniform', 1e21, 1e14, 'masetti', 2.50945154104, 2.5094514],
  ['phosphorus', 'gaussian', 1e17, 1e15, 'mf723', 1845.38734822, 1836.5966],
  ['phosphorus', 'gaussian', 1e19, 1e15, 'mf723', 160.160603417, 160.1173],
  ['phosphorus', 'erfc', 1e17, 1e15, 'mf723', 2356.10283625, 2343.2191],
  ['phosphorus', 'erfc', 1e19, 1e15, 'mf723', 206.474653463, 206.39453],
  ['phosphorus', 'exponential', 1e17, 1e15, 'masetti', 3358.05842828, 3336.2573],
  ['phosphorus', 'exponential', 1e17, 1e15, 'mf723', 3288.54018778, 3267.7969],
  ['phosphorus', 'exponential', 1e18, 1e16, 'masetti', 721.800908785, 709.52774],
  ['phosphorus', 'exponential', 1e18, 1e16, 'mf723', 719.223527877, 706.57186],
  ['phosphorus', 'exponential', 1e19, 1e15, 'mf723', 338.062195495, 337.82618],
  ['phosphorus', 'exponential', 1e20, 1e16, 'masetti', 61.7782430896, 61.719137],
  ['phosphorus', 'exponential', 1e20, 1e16, 'mf723', 60.0775069418, 60.02118],
  ['phosphorus', 'exponential', 1e21, 1e14, 'masetti', 23.99688101, 23.996803],
  ['phosphorus', 'uniform', 1e17, 1e15, 'masetti', 876.927674421, 874.03738],
  ['phosphorus', 'uniform', 1e17, 1e15, 'mf723', 849.512539744, 846.77597],
  ['phosphorus', 'uniform', 1e18, 1e16, 'masetti', 228.658963634, 227.63251],
  ['phosphorus', 'uniform', 1e18, 1e16, 'mf723', 239.198595898, 237.97167],
  ['phosphorus', 'uniform', 1e19, 1e15, 'mf723', 57.7607965952, 57.759568],
  ['phosphorus', 'uniform', 1e20, 1e16, 'masetti', 8.52450000889, 8.5243276],
  ['phosphorus', 'uniform', 1e20, 1e16, 'mf723', 7.70188423321, 7.7017903],
  ['phosphorus', 'uniform', 1e21, 1e14, 'masetti', 3.09428559269, 3.0942854],
  ['arsenic', 'erfc', 1e17, 1e15, 'masetti', 2407.66347801, 2394.3455],
  ['arsenic', 'erfc', 1e18, 1e16, 'masetti', 531.828872221, 524.91802],
  ['arsenic', 'erfc', 1e20, 1e16, 'masetti', 40.5672758341, 40.547116],
  ['arsenic', 'erfc', 1e21, 1e14, 'masetti', 14.3176314926, 14.317609],
  ['arsenic', 'exponential', 1e17, 1e15, 'masetti', 3357.36842964, 3336.0063],
  ['arsenic', 'exponential', 1e18, 1e16, 'masetti', 707.686759537, 696.0352],
  ['arsenic', 'exponential', 1e20, 1e16, 'masetti', 69.5663046651, 69.490511],
  ['arsenic', 'exponential', 1e21, 1e14, 'masetti', 29.0651403758, 29.065026],
  ['arsenic', 'uniform', 1e17, 1e15, 'masetti', 869.898331904, 867.13657],
  ['arsenic', 'uniform', 1e18, 1e16, 'masetti', 223.181769778, 222.16083],
  ['arsenic', 'uniform', 1e20, 1e16, 'masetti', 10.2555621712, 10.25532],
  ['arsenic', 'uniform', 1e21, 1e14, 'masetti', 3.92364038054, 3.9236401],
]

export const irvinLayers: readonly IrvinRow[] = rows.map(
  ([dopant, profile, surface_cm3, background_cm3, mobility, product_ohm_um, productOfMobilityAtN_ohm_um]) => {
    return { dopant, profile, surface_cm3, background_cm3, mobility, product_ohm_um, productOfMobilityAtN_ohm_um }
  },
)

/** Junction depth over sqrt(D t) at N_s = 5e18, N_B = 1e15: 2 sqrt(ln(N_s / N_B)) and 2 erfc^-1(N_B / N_s). */
export const junctionDepths = [
  { profile: 'gaussian', surface_cm3: 5e18, background_cm3: 1e15, depthInLengths: 5.836846132 },
  { profile: 'erfc', surface_cm3: 5e18, background_cm3: 1e15, depthInLengths: 5.259483552 },
] as const

/** Boron gaussian over 1e15, Masetti: two more points of the same computation, to four digits. */
export const boronGaussianPoints = [
  { surface_cm3: 2e18, background_cm3: 1e15, product_ohm_um: 640.8 },
  { surface_cm3: 5e18, background_cm3: 1e15, product_ohm_um: 373.4 },
  { surface_cm3: 1.1e18, background_cm3: 3e16, product_ohm_um: 725 },
] as const
