/** The five roles; free of imports, so that a browser may read them. */

export const studioRoles = ['designer', 'lead', 'producer'] as const;
export const clientRoles = ['reviewer', 'approver'] as const;
export const roles = [...studioRoles, ...clientRoles] as const;
export type Role = (typeof roles)[number];
export type StudioRole = (typeof studioRoles)[number];
export type ClientRole = (typeof clientRoles)[number];

export const isStudioRole = (role: Role): role is StudioRole =>
  (studioRoles as readonly string[]).includes(role);
export const sideOf = (role: Role): 'studio' | 'client' => (isStudioRole(role) ? 'studio' : 'client');
