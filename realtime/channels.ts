const uuid = '[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}';
const patterns = {
  workspace: new RegExp(`^private-workspace-(${uuid})$`),
  person: new RegExp(`^private-person-(${uuid})$`),
  revision: new RegExp(`^presence-revision-(${uuid})-(${uuid})$`),
};

export type Channel =
  | { kind: 'workspace'; workspaceId: string }
  | { kind: 'person'; personId: string }
  | { kind: 'revision'; workspaceId: string; revisionId: string };

/** Everything that changes in a workspace: ids only. */
export const workspaceChannel = (workspaceId: string) => `private-workspace-${workspaceId}`;
/** What concerns one person across workspaces. */
export const personChannel = (personId: string) => `private-person-${personId}`;
/** Who has a revision open. */
export const revisionChannel = (workspaceId: string, revisionId: string) =>
  `presence-revision-${workspaceId}-${revisionId}`;

/** Reads a channel name; null for any name that this program never makes. */
export function parseChannel(name: string): Channel | null {
  const workspace = patterns.workspace.exec(name);
  if (workspace) return { kind: 'workspace', workspaceId: workspace[1] };
  const person = patterns.person.exec(name);
  if (person) return { kind: 'person', personId: person[1] };
  const revision = patterns.revision.exec(name);
  if (revision) return { kind: 'revision', workspaceId: revision[1], revisionId: revision[2] };
  return null;
}
