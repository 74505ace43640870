import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { bubblePressureKilopascal, bubblePressureRaoultKilopascal, bubbleRangeCelsius, vapourMassFractions } from '#shared/refrigerants/mixture'
import { OutOfRange } from '#shared/refrigerants/out-of-range'
import { saturationPressureKilopascal } from '#shared/refrigerants/saturation'

const PAIRS = [
  ['R-134a', 'R-12'], ['R-134a', 'R-22'], ['R-134a', 'R-152a'], ['R-134a', 'R-290'], ['R-134a', 'R-600a'], ['R-134a', 'R-1234yf'], ['R-1234yf', 'R-152a'],
  ['R-1234yf', 'R-290'], ['R-1234yf', 'R-600a'], ['R-12', 'R-22'], ['R-12', 'R-152a'], ['R-290', 'R-600a'], ['R-22', 'R-290'], ['R-22', 'R-152a'],
] as const

describe('mixtures', () => {
  it('come close to each pure substance as the other one goes', () => {
    for (const [a, b] of PAIRS) {
      for (const [main, trace] of [[a, b], [b, a]] as const) {
        const found = bubblePressureKilopascal({ liquidMassFractions: { [main]: 1, [trace]: 1e-9 }, celsius: 20 }).kilopascalAbsolute
        expect(found / saturationPressureKilopascal({ substance: main, celsius: 20 }), `${main} with ${trace}`).toBeCloseTo(1, 6)
      }
    }
  })

  it('obey Gibbs and Duhem: x1 dlnγ1 + x2 dlnγ2 = 0 at one temperature', () => {
    const molar = { 'R-134a': 102.032, 'R-290': 44.096 }
    const logs = (x: number) => {
      const liquidMassFractions = { 'R-134a': x * molar['R-134a'], 'R-290': (1 - x) * molar['R-290'] }
      const { kilopascalAbsolute: p } = bubblePressureKilopascal({ liquidMassFractions, celsius: 25 })
      const vapour = vapourMassFractions({ liquidMassFractions, celsius: 25 })
      const amounts = [vapour['R-134a']! / molar['R-134a'], vapour['R-290']! / molar['R-290']]
      const y = amounts[0]! / (amounts[0]! + amounts[1]!)
      return [Math.log(y * p / (x * saturationPressureKilopascal({ substance: 'R-134a', celsius: 25 }))), Math.log((1 - y) * p / ((1 - x) * saturationPressureKilopascal({ substance: 'R-290', celsius: 25 })))]
    }
    fc.assert(fc.property(fc.double({ min: 0.05, max: 0.95, noNaN: true }), (x) => {
      const [above, below] = [logs(x + 1e-4), logs(x - 1e-4)]
      expect((x * (above[0]! - below[0]!) + (1 - x) * (above[1]! - below[1]!)) / 2e-4).toBeCloseTo(0, 4)
    }))
  })

  it('of R-134a and R-12 reach more pressure than either of them', () => {
    const { kilopascalAbsolute } = bubblePressureKilopascal({ liquidMassFractions: { 'R-134a': 0.46, 'R-12': 0.54 }, celsius: 25 })
    // 817 kPa by the mixture model, where Raoult would say 658.
    expect(Math.abs(kilopascalAbsolute / 817 - 1)).toBeLessThan(0.0055)
    expect(bubblePressureRaoultKilopascal({ liquidMassFractions: { 'R-134a': 0.46, 'R-12': 0.54 }, celsius: 25 })).toBeCloseTo(658, -1)
  })

  it('without published constants give the ideal pressure as the lowest and a stronger one as the highest', () => {
    const liquid = { liquidMassFractions: { 'R-1234yf': 0.95, 'R-12': 0.05 }, celsius: 25 }
    const found = bubblePressureKilopascal(liquid)
    expect(found.lowerEstimate).toBe(true)
    expect(found.kilopascalAbsolute).toBeCloseTo(bubblePressureRaoultKilopascal(liquid), 9)
    expect(found.highestKilopascalAbsolute).toBeGreaterThan(found.kilopascalAbsolute)
    const known = bubblePressureKilopascal({ liquidMassFractions: { 'R-134a': 0.95, 'R-12': 0.05 }, celsius: 25 })
    expect(known.highestKilopascalAbsolute).toBe(known.kilopascalAbsolute)
  })

  it('of three parts do not depend on the order, nor on the amount', () => {
    const forward = bubblePressureKilopascal({ liquidMassFractions: { 'R-134a': 0.9, 'R-12': 0.06, 'R-22': 0.04 }, celsius: 30 }).kilopascalAbsolute
    const backward = bubblePressureKilopascal({ liquidMassFractions: { 'R-22': 4, 'R-12': 6, 'R-134a': 90 }, celsius: 30 }).kilopascalAbsolute
    expect(backward).toBeCloseTo(forward, 9)
  })

  it('are refused outside the temperatures of the constants; one substance alone only outside its own', () => {
    const liquidMassFractions = { 'R-134a': 0.9, 'R-22': 0.1 }
    expect(bubbleRangeCelsius(liquidMassFractions)).toEqual({ lowestCelsius: 0, highestCelsius: 50 })
    for (const celsius of [-0.01, 50.01, Number.NaN]) {
      expect(() => bubblePressureKilopascal({ liquidMassFractions, celsius })).toThrow(OutOfRange)
      expect(() => vapourMassFractions({ liquidMassFractions, celsius })).toThrow(OutOfRange)
    }
    expect(bubbleRangeCelsius({ 'R-134a': 1, 'R-22': 0 })).toEqual({ lowestCelsius: -45, highestCelsius: 80 })
    expect(() => bubblePressureKilopascal({ liquidMassFractions: { 'R-134a': 1 }, celsius: 60 })).not.toThrow()
    expect(() => bubblePressureKilopascal({ liquidMassFractions: {}, celsius: 20 })).toThrow(RangeError)
  })
})
