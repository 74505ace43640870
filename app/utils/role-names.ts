import type { Role } from '#shared/access/roles'

export const ROLE_NAMES: Record<Role, string> = {
  technician: 'Technician',
  advisor: 'Service advisor',
  quality: 'Quality manager',
  owner: 'Shop owner',
}
