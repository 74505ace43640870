/** The roles of people in a shop, from least to most. */
export const ROLES = ['technician', 'advisor', 'quality', 'owner'] as const
export type Role = (typeof ROLES)[number]

/** What a signed-in person may do; the right stands in the first statement of each handler. */
export const RIGHTS = {
  'readings.see': ['technician', 'advisor', 'quality', 'owner'],
  'readings.enter': ['technician', 'quality', 'owner'],
  'readings.correct': ['quality', 'owner'],
  'certificates.withdraw': ['quality', 'owner'],
  'intake.see': ['technician', 'quality', 'owner'],
  'limits.see': ['technician', 'advisor', 'quality', 'owner'],
  'limits.edit': ['quality', 'owner'],
  'tokens.manage': ['owner'],
  'people.see': ['quality', 'owner'],
  'audit.see': ['quality', 'owner'],
} as const satisfies Record<string, readonly Role[]>
export type Right = keyof typeof RIGHTS

/** True where one of the roles carries the right. */
export function can(roles: readonly Role[], right: Right): boolean {
  const allowed: readonly Role[] = RIGHTS[right]
  return roles.some(role => allowed.includes(role))
}
