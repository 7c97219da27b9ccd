import type { WorkspaceContext } from '@/lib/auth/context';
import type { TenantTx } from '@/db/tenant';
import { listFacts } from './template-data';
import type { TemplateRow } from './revision-data';
import type { TemplateSummary } from './schemas';

/** Address of one file of a revision in our API; it leads on to the store. */
export const fileUrl = (
  ctx: WorkspaceContext,
  revisionId: string,
  kind: 'model' | 'picture' | 'thumbnail' | 'mesh',
) => `/api/v1/workspaces/${ctx.workspace.slug}/revisions/${revisionId}/${kind}`;

const undecided = new Set(['in_review', 'returned']);

/** Templates as lists show them; three statements for any number of them. */
export async function summarise(
  tx: TenantTx,
  ctx: WorkspaceContext,
  templates: TemplateRow[],
): Promise<TemplateSummary[]> {
  const ids = templates.flatMap((template) => template.latestRevisionId ?? []);
  const facts = await listFacts(tx, ctx.workspace.id, ids);
  return templates.map((template) => {
    const fact = template.latestRevisionId ? facts.get(template.latestRevisionId) : undefined;
    return {
      id: template.id,
      number: template.number,
      title: template.title,
      dueOn: template.dueOn,
      standing: template.standing,
      latestRevisionId: template.latestRevisionId,
      latestLetter: template.latestLetter,
      verdict: fact?.verdict ?? null,
      openMustSettle: undecided.has(template.standing) ? (fact?.mustSettle ?? 0) : 0,
      thumbnailUrl:
        fact?.picture && template.latestRevisionId
          ? fileUrl(ctx, template.latestRevisionId, 'thumbnail')
          : null,
      changedAt: template.changedAt.toISOString(),
      version: template.version,
    };
  });
}
