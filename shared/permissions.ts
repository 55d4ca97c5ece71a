/** Roles of one person in one organisation. */
export const ROLES = ['trainee', 'technician', 'instructor', 'administrator'] as const;
export type Role = (typeof ROLES)[number];

/**
 * Who may do what, used by both sides: the server refuses by it, the client shows by it.
 * One row per permission; a role that is not named may not.
 */
export const PERMISSIONS = {
  'attempts:read-others': ['instructor', 'administrator'],
  'attempts:read-own': ['trainee', 'technician', 'instructor'],
  'attempts:run': ['trainee', 'technician', 'instructor'],
  'bench:use': ROLES,
  'exercises:read': ROLES,
} as const satisfies Record<string, readonly Role[]>;
export type Permission = keyof typeof PERMISSIONS;

/** Whether `role` holds `permission`. */
export function may(role: Role, permission: Permission): boolean {
  return (PERMISSIONS[permission] as readonly Role[]).includes(role);
}
