import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { parseInput } from '@/lib/http/read-input';
import { queueLive } from '@/lib/jobs/queue-live';
import { asId } from './as-id';
import { changedMeanwhile } from './changed-meanwhile';
import { lockTemplate } from './revision-data';
import { ChangeTemplateInput, type TemplateSummary } from './schemas';
import { updateTemplate } from './template-data';
import { summarise } from './template-summary';

/** Changes title or due date of a template that is still at the version that the caller saw. */
export async function changeTemplate(
  ctx: WorkspaceContext,
  templateId: string,
  input: unknown,
): Promise<TemplateSummary> {
  requirePermission(ctx, 'template.change');
  const { version, ...change } = parseInput(ChangeTemplateInput, input);
  const id = asId(templateId, 'template');
  return withTenant(ctx, async (tx) => {
    const before = await lockTemplate(tx, ctx.workspace.id, id);
    const template = await updateTemplate(tx, { workspaceId: ctx.workspace.id, id, version }, change);
    if (!template) throw changedMeanwhile('template', before.version);
    await appendEntry(tx, ctx, {
      action: 'template.changed',
      subjectKind: 'template',
      subjectId: id,
      detail: {
        number: template.number,
        before: { title: before.title, dueOn: before.dueOn },
        after: { title: template.title, dueOn: template.dueOn },
      },
    });
    await queueLive(tx, ctx, { name: 'template.changed', data: { id, version: template.version } });
    return (await summarise(tx, ctx, [template]))[0];
  });
}
