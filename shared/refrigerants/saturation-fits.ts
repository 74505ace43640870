/** A refrigerant whose saturation line is known here. Blends and groups have none: they boil over a range, or are not one thing. */
export const SATURATED = ['R-134a', 'R-1234yf', 'R-12', 'R-22', 'R-152a', 'R-290', 'R-600a', 'R-744'] as const
export type Saturated = (typeof SATURATED)[number]

const known: ReadonlySet<string> = new Set(SATURATED)
export const isSaturated = (substance: string): substance is Saturated => known.has(substance)

export interface SaturationFit {
  criticalKelvin: number
  criticalKilopascal: number
  criticalKilogramsPerCubicMetre: number
  lowestCelsius: number
  highestCelsius: number
  pressure: readonly [number, number, number, number]
  liquidDensity: readonly [number, number, number, number]
  vapourDensity: readonly [number, number, number, number, number]
  /** Equation of state that the coefficients were fitted to. */
  source: string
}

/**
 * Coefficients fitted by least squares on a 1 K grid of the named equations of state; largest deviation
 * in the range: pressure 0.028 %, liquid density 0.033 %, vapour density 0.025 %.
 */
export const SATURATION_FITS: Readonly<Record<Saturated, SaturationFit>> = {
  'R-134a': {
    criticalKelvin: 374.21, criticalKilopascal: 4059.28, criticalKilogramsPerCubicMetre: 511.9, lowestCelsius: -45, highestCelsius: 80,
    pressure: [-7.634938, 1.748988, -2.580132, -3.434312],
    liquidDensity: [1.641515, 1.776085, -1.885145, 1.348867],
    vapourDensity: [-1.878921, -2.348181, -5.859781, -16.833284, -48.646832],
    source: 'Tillner-Roth & Baehr 1994, J. Phys. Chem. Ref. Data 23, 657 (doi 10.1063/1.555958)',
  },
  'R-1234yf': {
    criticalKelvin: 367.85, criticalKilopascal: 3384.4, criticalKilogramsPerCubicMetre: 476.6939, lowestCelsius: -45, highestCelsius: 80,
    pressure: [-7.408519, 1.715883, -2.206711, -3.252639],
    liquidDensity: [1.674503, 1.334014, -1.096405, 0.882304],
    vapourDensity: [-1.843675, -2.26991, -5.673458, -15.401681, -47.032885],
    source: 'Lemmon & Akasaka 2022, Int. J. Thermophys. 43, 119 (doi 10.1007/s10765-022-03015-y)',
  },
  'R-12': {
    criticalKelvin: 385.12, criticalKilopascal: 4136.1, criticalKilogramsPerCubicMetre: 565.0, lowestCelsius: -45, highestCelsius: 80,
    pressure: [-6.921328, 1.63544, -1.773548, -2.462802],
    liquidDensity: [1.484967, 1.793828, -1.911148, 1.326766],
    vapourDensity: [-1.723357, -2.184026, -5.140282, -13.817244, -39.215175],
    source: 'Marx, Pruss & Wagner 1992, VDI Fortschritt-Berichte series 19 no. 57',
  },
  'R-22': {
    criticalKelvin: 369.295, criticalKilopascal: 4990.0, criticalKilogramsPerCubicMetre: 523.8422, lowestCelsius: -45, highestCelsius: 80,
    pressure: [-7.051654, 1.490775, -1.833625, -2.798806],
    liquidDensity: [1.664655, 1.188259, -0.926113, 0.841932],
    vapourDensity: [-1.797186, -2.155918, -5.464788, -14.614431, -41.240973],
    source: 'Kamei, Beyerlein & Jacobsen 1995, Int. J. Thermophys. 16, 1155 (doi 10.1007/BF02081283)',
  },
  'R-152a': {
    criticalKelvin: 386.411, criticalKilopascal: 4516.75, criticalKilogramsPerCubicMetre: 368.0, lowestCelsius: -45, highestCelsius: 80,
    pressure: [-7.416596, 1.704006, -2.099616, -2.845431],
    liquidDensity: [1.589186, 2.087981, -2.290793, 1.544969],
    vapourDensity: [-1.979605, -2.040896, -5.977592, -14.963904, -44.983007],
    source: 'Outcalt & McLinden 1996, J. Phys. Chem. Ref. Data 25, 605 (doi 10.1063/1.555979)',
  },
  'R-290': {
    criticalKelvin: 369.89, criticalKilopascal: 4251.2, criticalKilogramsPerCubicMetre: 220.4781, lowestCelsius: -45, highestCelsius: 80,
    pressure: [-6.750407, 1.504184, -1.491843, -2.282833],
    liquidDensity: [1.598592, 1.215218, -0.960204, 0.773346],
    vapourDensity: [-1.658775, -2.283205, -4.83971, -13.606741, -35.179207],
    source: 'Lemmon, McLinden & Wagner 2009, J. Chem. Eng. Data 54, 3141 (doi 10.1021/je900217v)',
  },
  'R-600a': {
    criticalKelvin: 407.817, criticalKilopascal: 3629.0, criticalKilogramsPerCubicMetre: 225.5, lowestCelsius: -45, highestCelsius: 80,
    pressure: [-6.878286, 1.47614, -1.619147, -2.797275],
    liquidDensity: [1.482866, 2.075071, -2.465976, 1.632569],
    vapourDensity: [-1.751098, -2.090229, -5.335481, -13.606767, -40.911078],
    source: 'Buecker & Wagner 2006, J. Phys. Chem. Ref. Data 35, 929 (doi 10.1063/1.1901687)',
  },
  'R-744': {
    criticalKelvin: 304.1282, criticalKilopascal: 7377.3, criticalKilogramsPerCubicMetre: 467.6, lowestCelsius: -45, highestCelsius: 30,
    pressure: [-7.027011, 1.531375, -2.271289, -2.161618],
    liquidDensity: [1.69545, 0.834247, 0.019481, 0.15894],
    vapourDensity: [-1.696554, -2.335447, -5.210541, -15.791867, -34.942067],
    source: 'Span & Wagner 1996, J. Phys. Chem. Ref. Data 25, 1509 (doi 10.1063/1.555991)',
  },
}
