import { describe, expect, it } from 'vitest'
import { figure, limitFigure, padToPoint } from '#shared/composition/figures'
import { byteText, countText, keepUnits } from '../../../app/utils/figures'

describe('figure', () => {
  it('keeps the significant figures of the instrument', () => {
    expect(figure(98.4, 0.1)).toBe('98.4')
    expect(figure(98.4, 1)).toBe('98')
    expect(figure(98, 0.1)).toBe('98.0')
    expect(figure(0.05, 0.05)).toBe('0.05')
  })

  it('writes a true minus and no minus before zero', () => {
    expect(figure(-0.04, 0.1)).toBe('0.0')
    expect(figure(-1.26, 0.1)).toBe('\u22121.3')
  })
})

it('shows a limit with no fewer decimals than it was set with', () => {
  expect(limitFigure(98, 1)).toBe('98.0')
  expect(limitFigure(0.05, 0.1)).toBe('0.05')
})

it('brings decimal points under one another', () => {
  const texts = ['100', '98.4', '0.05'].map(text => padToPoint(text, 2))
  expect(texts).toEqual(['100   ', '98.4 ', '0.05'])
  expect(padToPoint('98', 0)).toBe('98')
})

it('groups counts and names sizes', () => {
  expect(countText(1234567)).toBe('1\u202f234\u202f567')
  expect(byteText(999)).toBe('999 B')
  expect(byteText(1500)).toBe('1.5 kB')
  expect(byteText(2_500_000)).toBe('2.5 MB')
})

it('keeps a unit on the line of its number, and words as they are', () => {
  expect(keepUnits('98.1 ± 0.6 % R-134a, limit 98 % at 20 °C')).toBe('98.1 ± 0.6\u00a0% R-134a, limit 98\u00a0% at 20\u00a0°C')
  expect(keepUnits('sample 2 of 3')).toBe('sample 2 of 3')
})
