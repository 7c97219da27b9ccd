import { notFound } from '@/lib/errors/app-error';
import {
  studioContext,
  workspaceContext,
  type Person,
  type StudioContext,
  type WorkspaceContext,
} from './context';
import { findMembership, findMemberships, findStudioMembership } from './auth-data';

/** Enters the workspace named in the address (slug or id). Not a member and no such workspace answer alike. */
export async function enterWorkspace(person: Person, workspace: string): Promise<WorkspaceContext> {
  const found = await findMembership(person.id, workspace);
  if (!found) throw notFound('workspace');
  return workspaceContext({ person, workspace: found.workspace, studio: found.studio, role: found.role });
}

/** Enters every workspace that the person belongs to, in the order of their ids. */
export async function enterEveryWorkspace(person: Person): Promise<WorkspaceContext[]> {
  const found = await findMemberships(person.id);
  return found.map(({ workspace, studio, role }) => workspaceContext({ person, workspace, studio, role }));
}

/** Enters a studio as its staff. */
export async function enterStudio(person: Person, studio: string): Promise<StudioContext> {
  const found = await findStudioMembership(person.id, studio);
  if (!found) throw notFound('studio');
  return studioContext({ person, studio: found.studio, role: found.role });
}
