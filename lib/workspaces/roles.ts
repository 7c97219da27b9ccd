import { createAccessControl } from 'better-auth/plugins/access';

import { clientRoles, isStudioRole, roles, sideOf, studioRoles } from './role-names';
import type { ClientRole, Role, StudioRole } from './role-names';

export { clientRoles, isStudioRole, roles, sideOf, studioRoles };
export type { ClientRole, Role, StudioRole };

/** What can be done in a workspace. The organization plugin's own resources are named so that it may ask too. */
const statements = {
  organization: ['update', 'delete'],
  member: ['create', 'update', 'delete'],
  invitation: ['create', 'cancel'],
  workspace: ['read'],
  people: ['read', 'invite', 'change'],
  template: ['create', 'change'],
  revision: ['post', 'withdraw', 'release', 'recall', 'retire'],
  gate: ['sign', 'plan'],
  finding: ['waive'],
  docket: ['note', 'settle'],
  pack: ['download'],
  activity: ['read'],
} as const;

export const accessControl = createAccessControl(statements);

const everyone = {
  workspace: ['read'],
  people: ['read'],
  docket: ['note', 'settle'],
  activity: ['read'],
} as const;
const makes = { template: ['create', 'change'], revision: ['post', 'withdraw'] } as const;

/** Roles as the organization plugin knows them; `permits` below is how verbs ask. */
export const accessRoles = {
  designer: accessControl.newRole({ ...everyone, ...makes, gate: ['sign'], pack: ['download'] }),
  lead: accessControl.newRole({
    ...everyone,
    template: ['create', 'change'],
    revision: ['post', 'withdraw', 'release', 'recall', 'retire'],
    people: ['read', 'invite', 'change'],
    gate: ['sign', 'plan'],
    finding: ['waive'],
    pack: ['download'],
  }),
  producer: accessControl.newRole({
    ...everyone,
    revision: ['release', 'recall', 'retire'],
    pack: ['download'],
  }),
  reviewer: accessControl.newRole(everyone),
  approver: accessControl.newRole({ ...everyone, gate: ['sign'], pack: ['download'] }),
};

type Statements = typeof statements;
export type Permission = { [R in keyof Statements]: `${R}.${Statements[R][number]}` }[keyof Statements];

/** Whether a role may do a thing, e.g. `permits('producer', 'revision.release')`. */
export function permits(role: Role, permission: Permission): boolean {
  const [resource, action] = permission.split('.') as [keyof Statements, string];
  return accessRoles[role].authorize({ [resource]: [action] } as never).success;
}
