import type { LiveEvent } from '@/realtime/events';

/** Names of everything that react-query keeps of a workspace; `workspaceId` is its id, never its slug. */
export const queryKeys = {
  workspace: (workspaceId: string) => ['workspace', workspaceId] as const,
  people: (workspaceId: string) => ['workspace', workspaceId, 'people'] as const,
  templates: (workspaceId: string) => ['workspace', workspaceId, 'templates'] as const,
  template: (workspaceId: string, templateId: string) =>
    ['workspace', workspaceId, 'template', templateId] as const,
  draft: (workspaceId: string, templateId: string) =>
    ['workspace', workspaceId, 'draft', templateId] as const,
  upload: (workspaceId: string, uploadId: string) => ['workspace', workspaceId, 'upload', uploadId] as const,
  revision: (workspaceId: string, revisionId: string) =>
    ['workspace', workspaceId, 'revision', revisionId] as const,
  /** Every revision that is kept. */
  revisions: (workspaceId: string) => ['workspace', workspaceId, 'revision'] as const,
  docket: (workspaceId: string, revisionId: string) =>
    ['workspace', workspaceId, 'docket', revisionId] as const,
  /** Frozen once it is there: no event makes it stale. */
  report: (workspaceId: string, revisionId: string) =>
    ['workspace', workspaceId, 'report', revisionId] as const,
  content: (workspaceId: string, revisionId: string) =>
    ['workspace', workspaceId, 'content', revisionId] as const,
  /** Stage and share of a job that runs on a revision or upload; filled by live events, never fetched. */
  progress: (subjectId: string) => ['progress', subjectId] as const,
  today: () => ['today'] as const,
};

/** What must be fetched again after a live event. Events carry ids only, so the answer is always a fetch. */
export function staleAfter(workspaceId: string | null, event: LiveEvent): readonly (readonly unknown[])[] {
  if (event.name === 'today.changed') return [queryKeys.today()];
  if (!workspaceId) return [];
  switch (event.name) {
    case 'template.changed':
      return [queryKeys.templates(workspaceId), queryKeys.template(workspaceId, event.data.id)];
    case 'draft.changed':
      return [queryKeys.draft(workspaceId, event.data.templateId)];
    case 'upload.changed':
      return [
        queryKeys.upload(workspaceId, event.data.id),
        queryKeys.draft(workspaceId, event.data.templateId),
      ];
    case 'revision.changed':
      return [
        queryKeys.revision(workspaceId, event.data.id),
        queryKeys.docket(workspaceId, event.data.id),
        queryKeys.content(workspaceId, event.data.id),
        queryKeys.templates(workspaceId),
        queryKeys.template(workspaceId, event.data.templateId),
      ];
    // What is signed contains the docket, so the revision's digest moves with it.
    case 'docket.changed':
      return [
        queryKeys.docket(workspaceId, event.data.revisionId),
        queryKeys.revision(workspaceId, event.data.revisionId),
        queryKeys.content(workspaceId, event.data.revisionId),
        queryKeys.templates(workspaceId),
      ];
    case 'people.changed':
      return [queryKeys.people(workspaceId)];
    // Who is awaited at a gate follows who stands in for whom; the page of the plan itself asks the server anew.
    case 'gate-plan.changed':
      return [queryKeys.revisions(workspaceId)];
    case 'job.progressed':
      return [];
  }
}
