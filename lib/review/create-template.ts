import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { parseInput } from '@/lib/http/read-input';
import { queueLive } from '@/lib/jobs/queue-live';
import { CreateTemplateInput, type TemplateSummary } from './schemas';
import { insertTemplate, nextSerial } from './template-data';
import { summarise } from './template-summary';

/** Opens a template under the workspace's next number, e.g. `QLN-007`; numbers have no gaps. */
export async function createTemplate(ctx: WorkspaceContext, input: unknown): Promise<TemplateSummary> {
  requirePermission(ctx, 'template.create');
  const { title, dueOn } = parseInput(CreateTemplateInput, input);
  return withTenant(ctx, async (tx) => {
    const { serial, code } = await nextSerial(tx, ctx.workspace.id);
    const template = await insertTemplate(tx, {
      workspaceId: ctx.workspace.id,
      serial,
      number: `${code}-${String(serial).padStart(3, '0')}`,
      title,
      dueOn,
      createdBy: ctx.person.id,
    });
    await appendEntry(tx, ctx, {
      action: 'template.created',
      subjectKind: 'template',
      subjectId: template.id,
      detail: { number: template.number, title, dueOn },
    });
    await queueLive(tx, ctx, {
      name: 'template.changed',
      data: { id: template.id, version: template.version },
    });
    return (await summarise(tx, ctx, [template]))[0];
  });
}
