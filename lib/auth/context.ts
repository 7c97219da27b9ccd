import { makeScope, type Scope } from '@/db/scope';
import { forbidden } from '@/lib/errors/app-error';
import { permits, type Permission, type Role, type StudioRole } from '@/lib/workspaces/roles';

declare const checked: unique symbol;
type Checked = { readonly [checked]: true };

export type Person = { id: string; name: string; email: string; timeZone: string; units: 'mm' | 'in' };
export type Studio = { id: string; name: string; slug: string; timeZone: string };
export type Workspace = {
  id: string;
  studioId: string;
  name: string;
  slug: string;
  code: string;
  timeZone: string;
};

/** A person in one workspace, in a role, made only after the membership was read for this request. */
export type WorkspaceContext = Checked & {
  readonly kind: 'workspace';
  readonly person: Person;
  readonly workspace: Workspace;
  readonly studio: Studio;
  readonly role: Role;
  readonly scope: Scope;
};

/** Staff of a studio, across its workspaces. */
export type StudioContext = Checked & {
  readonly kind: 'studio';
  readonly person: Person;
  readonly studio: Studio;
  readonly role: StudioRole;
  readonly scope: Scope;
};

/** A person at their desk: everything they belong to, nothing else. */
export type PersonContext = Checked & {
  readonly kind: 'person';
  readonly person: Person;
  readonly scope: Scope;
};

/** Background work in one workspace, made by the job runner from a claimed job. */
export type JobContext = Checked & {
  readonly kind: 'job';
  readonly workspaceId: string;
  readonly scope: Scope;
};

export function workspaceContext(fields: {
  person: Person;
  workspace: Workspace;
  studio: Studio;
  role: Role;
}): WorkspaceContext {
  const scope = makeScope({
    kind: 'workspace',
    personId: fields.person.id,
    workspaceId: fields.workspace.id,
  });
  return { kind: 'workspace', scope, ...fields } as WorkspaceContext;
}

export function studioContext(fields: { person: Person; studio: Studio; role: StudioRole }): StudioContext {
  const scope = makeScope({ kind: 'studio', personId: fields.person.id, studioId: fields.studio.id });
  return { kind: 'studio', scope, ...fields } as StudioContext;
}

export function personContext(person: Person): PersonContext {
  return {
    kind: 'person',
    scope: makeScope({ kind: 'person', personId: person.id }),
    person,
  } as PersonContext;
}

export function jobContext(workspaceId: string): JobContext {
  return { kind: 'job', workspaceId, scope: makeScope({ kind: 'job', workspaceId }) } as JobContext;
}

/** The workspace that a context writes to. */
export const workspaceIdOf = (ctx: WorkspaceContext | JobContext) =>
  ctx.kind === 'job' ? ctx.workspaceId : ctx.workspace.id;

/** First line of every verb that needs a right in a workspace. */
export function requirePermission(ctx: WorkspaceContext, permission: Permission): void {
  if (!permits(ctx.role, permission))
    throw forbidden(
      `Your role here is ${ctx.role}; it does not allow this (${permission}). Ask a lead of ${ctx.studio.name}.`,
    );
}

/** First line of every verb that only some roles of the studio may use. */
export function requireStudioRole(ctx: StudioContext, ...allowed: StudioRole[]): void {
  if (!allowed.includes(ctx.role))
    throw forbidden(
      `This needs the role ${allowed.join(' or ')} at ${ctx.studio.name}; yours is ${ctx.role}.`,
    );
}
