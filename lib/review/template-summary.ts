import type { WorkspaceContext } from '@/lib/auth/context';
import type { TenantTx } from '@/db/tenant';
import { listFacts } from './template-data';
import type { TemplateRow } from './revision-data';
import type { TemplateSummary } from './schemas';
import { onItsWay } from './standing';

/** Address of one file of a revision in our API; it leads on to the store. */
export const fileUrl = (
  ctx: WorkspaceContext,
  revisionId: string,
  kind: 'model' | 'picture' | 'thumbnail' | 'sheet' | 'mesh',
) => `/api/v1/workspaces/${ctx.workspace.slug}/revisions/${revisionId}/${kind}`;

/** The newer revision on its way, where the template stands on an older one. */
function aheadOf(template: TemplateRow): TemplateSummary['ahead'] {
  const { latestRevisionId: id, latestLetter: letter, latestStanding: standing } = template;
  if (!id || !letter || !standing || id === template.standingRevisionId) return null;
  return onItsWay.includes(standing) ? { id, letter, standing } : null;
}

/** Templates as lists show them; three statements for any number of them. */
export async function summarise(
  tx: TenantTx,
  ctx: WorkspaceContext,
  templates: TemplateRow[],
): Promise<TemplateSummary[]> {
  const ids = templates.flatMap((template) => [
    ...(template.standingRevisionId ? [template.standingRevisionId] : []),
    ...(aheadOf(template) && template.latestRevisionId ? [template.latestRevisionId] : []),
  ]);
  const facts = await listFacts(tx, ctx.workspace.id, ids);
  return templates.map((template) => {
    const { standing, standingRevisionId, standingLetter } = template;
    const ahead = aheadOf(template);
    const fact = standingRevisionId ? facts.get(standingRevisionId) : undefined;
    const undecided = ahead?.id ?? (onItsWay.includes(standing) ? standingRevisionId : null);
    return {
      id: template.id,
      number: template.number,
      title: template.title,
      dueOn: template.dueOn,
      standing,
      standingRevisionId,
      standingLetter,
      ahead,
      latestRevisionId: template.latestRevisionId,
      latestLetter: template.latestLetter,
      verdict: fact?.verdict ?? null,
      openMustSettle: (undecided && facts.get(undecided)?.mustSettle) || 0,
      thumbnailUrl:
        fact?.picture && standingRevisionId ? fileUrl(ctx, standingRevisionId, 'thumbnail') : null,
      changedAt: template.changedAt.toISOString(),
      version: template.version,
    };
  });
}
