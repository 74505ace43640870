/** Open event streams: each would hold a shutdown up, so the shutdown ends them first. */
export const streams = new Set<() => void>()
