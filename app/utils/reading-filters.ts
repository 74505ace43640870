import type { LocationQuery, LocationQueryValue } from 'vue-router'
import type { ReadingFilters } from '#shared/api/readings'
import { SUBJECT_KINDS } from '#shared/intake/kinds'
import { DESIGNATIONS } from '#shared/refrigerants/designations'
import { VERDICTS } from '#shared/verdict/types'

const UUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/i
const DAY = /^\d{4}-(0[1-9]|1[0-2])-(0[1-9]|[12]\d|3[01])$/

function all(value: LocationQueryValue | LocationQueryValue[] | undefined): string[] {
  return [value].flat().filter((one): one is string => typeof one === 'string' && one !== '')
}

function among<T extends string>(value: LocationQuery[string] | undefined, allowed: readonly T[]): T[] | undefined {
  const chosen = all(value).filter((one): one is T => (allowed as readonly string[]).includes(one))
  return chosen.length > 0 ? [...new Set(chosen)] : undefined
}

function matching(value: LocationQuery[string] | undefined, pattern: RegExp): string[] | undefined {
  const chosen = all(value).filter(one => pattern.test(one))
  return chosen.length > 0 ? [...new Set(chosen)] : undefined
}

/**
 * Filters out of the page's address. What the address spells wrongly is left out, so that an old or
 * hand-written address still opens; the server checks again.
 */
export function filtersFromAddress(query: LocationQuery): ReadingFilters {
  const filters: ReadingFilters = {
    verdict: among(query.verdict, VERDICTS),
    declared: among(query.declared, DESIGNATIONS),
    from: matching(query.from, DAY)?.[0],
    to: matching(query.to, DAY)?.[0],
    shop: matching(query.shop, UUID),
    instrument: matching(query.instrument, UUID),
    subject: among(query.subject, SUBJECT_KINDS),
    batch: all(query.batch)[0]?.slice(0, 200),
    text: all(query.text)[0]?.slice(0, 200),
    submission: matching(query.submission, UUID)?.[0],
  }
  return Object.fromEntries(Object.entries(filters).filter(([, value]) => value !== undefined))
}

/** The same filters for an address or a request; empty ones fall away. */
export function filtersToQuery(filters: ReadingFilters): Record<string, string | string[]> {
  const query: Record<string, string | string[]> = {}
  for (const [name, value] of Object.entries(filters)) {
    if (Array.isArray(value) ? value.length > 0 : value) query[name] = value
  }
  return query
}

/** How many kinds of filter are set. */
export function filterCount(filters: ReadingFilters): number {
  return Object.keys(filtersToQuery(filters)).length
}
