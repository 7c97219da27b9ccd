import { withTenant } from '@/db/tenant';
import { requirePermission, type WorkspaceContext } from '@/lib/auth/context';
import { asId } from './as-id';
import type { TemplateSummary } from './schemas';
import { findTemplate } from './template-data';
import { summarise } from './template-summary';

/** One template as lists show it. */
export async function viewTemplate(ctx: WorkspaceContext, templateId: string): Promise<TemplateSummary> {
  requirePermission(ctx, 'workspace.read');
  const id = asId(templateId, 'template');
  return withTenant(ctx, async (tx) => {
    const template = await findTemplate(tx, ctx.workspace.id, id);
    return (await summarise(tx, ctx, [template]))[0];
  });
}
