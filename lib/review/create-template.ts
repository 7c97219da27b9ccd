import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { invalid } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { queueLive } from '@/lib/jobs/queue-live';
import { dayIn } from '@/lib/time/day-in';
import { CreateTemplateInput, type TemplateSummary } from './schemas';
import { insertTemplate, nextSerial } from './template-data';
import { summarise } from './template-summary';

/** Opens a template under the workspace's next number, e.g. `QLN-007`; numbers have no gaps. */
export async function createTemplate(ctx: WorkspaceContext, input: unknown): Promise<TemplateSummary> {
  requirePermission(ctx, 'template.create');
  const { title, dueOn } = parseInput(CreateTemplateInput, input);
  if (dueOn && dueOn < dayIn(ctx.person.timeZone))
    throw invalid('A new template is due in the future.', [
      { pointer: '/dueOn', detail: 'This day is over. Give a day from today on.' },
    ]);
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
