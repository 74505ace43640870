/**
 * Times in the shop's zone. Only numbers are taken from `Intl`; the text is put together here, because
 * the server's and the browser's language data differ in spaces and commas and would not hydrate.
 */
const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'] as const

interface Clock { year: string, month: string, day: string, hour: string, minute: string, second: string }

const formats = new Map<string, Intl.DateTimeFormat>()

function formatFor(timeZone: string): Intl.DateTimeFormat {
  let format = formats.get(timeZone)
  if (!format) {
    format = new Intl.DateTimeFormat('en-GB', {
      timeZone, hourCycle: 'h23', year: 'numeric', month: '2-digit', day: '2-digit', hour: '2-digit', minute: '2-digit', second: '2-digit',
    })
    formats.set(timeZone, format)
  }
  return format
}

function clock(iso: string, timeZone: string): Clock {
  const parts = formatFor(timeZone).formatToParts(new Date(iso))
  const part = (type: Intl.DateTimeFormatPartTypes) => parts.find(one => one.type === type)?.value ?? ''
  return { year: part('year'), month: part('month'), day: part('day'), hour: part('hour'), minute: part('minute'), second: part('second') }
}

/** `2026-12-01`: the day in the zone, as filters and tables write it. */
export function dayIn(iso: string, timeZone: string): string {
  const { year, month, day } = clock(iso, timeZone)
  return `${year}-${month}-${day}`
}

/** `14:05` */
export function timeIn(iso: string, timeZone: string): string {
  const { hour, minute } = clock(iso, timeZone)
  return `${hour}:${minute}`
}

/** `2026-12-01 14:05`: for tables, where it sorts and aligns. */
export function stampIn(iso: string, timeZone: string): string {
  return `${dayIn(iso, timeZone)} ${timeIn(iso, timeZone)}`
}

/** `1 Dec 2026`: for sentences and headings. */
export function longDayIn(iso: string, timeZone: string): string {
  const { year, month, day } = clock(iso, timeZone)
  return `${Number(day)} ${MONTHS[Number(month) - 1]} ${year}`
}

/** `1 Dec 2026, 14:05:09` */
export function longStampIn(iso: string, timeZone: string): string {
  const { hour, minute, second } = clock(iso, timeZone)
  return `${longDayIn(iso, timeZone)}, ${hour}:${minute}:${second}`
}

/** `Europe/Berlin` → `Berlin time` */
export function zoneText(timeZone: string): string {
  return timeZone === 'UTC' ? 'UTC' : `${timeZone.split('/').at(-1)!.replaceAll('_', ' ')} time`
}
