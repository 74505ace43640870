import { describe, expect, it } from 'vitest'
import { readingFilters } from '../../../shared/api/readings'
import { filterCount, filtersFromAddress, filtersToQuery } from '../../../app/utils/reading-filters'

const shop = '0198f000-0000-7000-8000-000000000001'

describe('filtersFromAddress', () => {
  it('reads single and repeated names', () => {
    expect(filtersFromAddress({ verdict: 'isolate', declared: ['R-134a', 'R-1234yf'], shop, text: 'NV 12', from: '2026-01-01' }))
      .toEqual({ verdict: ['isolate'], declared: ['R-134a', 'R-1234yf'], shop: [shop], text: 'NV 12', from: '2026-01-01' })
  })

  it('leaves out what is spelled wrongly, and other names', () => {
    expect(filtersFromAddress({ verdict: ['isolate', 'burn'], declared: 'R-999', shop: 'x', from: '1.1.2026', to: null, open: shop })).toEqual({ verdict: ['isolate'] })
  })

  it('gives only what the API takes', () => {
    const filters = filtersFromAddress({ verdict: ['isolate', 'isolate'], subject: 'lot', batch: 'a', text: 'x'.repeat(500), to: '2026-12-31', submission: shop, instrument: [shop] })
    expect(readingFilters.safeParse(filters).success).toBe(true)
  })
})

it('goes to the address and back unchanged', () => {
  const filters = { verdict: ['isolate' as const], from: '2026-01-01', to: undefined, text: '', shop: [] }
  expect(filtersToQuery(filters)).toEqual({ verdict: ['isolate'], from: '2026-01-01' })
  expect(filtersFromAddress(filtersToQuery(filters))).toEqual({ verdict: ['isolate'], from: '2026-01-01' })
  expect(filterCount(filters)).toBe(2)
})
