import type { Role } from '@/lib/schemas/common';

/** "owner and author", "student", "author, owner and statistician". */
export function listRoles(roles: readonly Role[]): string {
  if (roles.length < 2) return roles.join('');
  return `${roles.slice(0, -1).join(', ')} and ${roles[roles.length - 1]}`;
}
