import { uuidv7 } from 'uuidv7';
import { withTenant } from '@/db/tenant';
import { appendEntry } from '@/lib/audit/append-entry';
import { requireStudioRole, workspaceContext, type StudioContext } from '@/lib/auth/context';
import { conflict } from '@/lib/errors/app-error';
import { parseInput } from '@/lib/http/read-input';
import { insertStudioEntry } from '@/lib/studio/studio-data';
import { defaultGatePlan } from './default-gate-plan';
import { makeSlug } from './make-slug';
import { CreateWorkspaceInput, type WorkspaceView } from './schemas';
import { findWorkspaceByCode, insertGatePlan, insertWorkspace } from './workspaces-data';

/** A lead opens a workspace for a client organisation, with version 1 of its gate plan. */
export async function createWorkspace(
  ctx: StudioContext,
  input: unknown,
): Promise<Pick<WorkspaceView, 'id' | 'name' | 'slug' | 'code' | 'timeZone'>> {
  requireStudioRole(ctx, 'lead');
  const { name, code, timeZone } = parseInput(CreateWorkspaceInput, input);
  return withTenant(ctx, async (tx) => {
    const taken = await findWorkspaceByCode(tx, ctx.studio.id, code);
    if (taken)
      throw conflict(
        'code-taken',
        `The code ${code} is used by ${taken.name}. Choose another for this client.`,
      );
    const workspace = {
      id: uuidv7(),
      studioId: ctx.studio.id,
      name,
      slug: makeSlug(name),
      code,
      timeZone: timeZone ?? ctx.studio.timeZone,
    };
    let made = await insertWorkspace(tx, workspace);
    for (let tries = 1; !made && tries < 4; tries++)
      made = await insertWorkspace(tx, Object.assign(workspace, { slug: makeSlug(name) }));
    if (!made) throw conflict('code-taken', `The code ${code} was taken this moment. Choose another.`);
    const planId = uuidv7();
    await insertGatePlan(tx, {
      id: planId,
      workspaceId: workspace.id,
      number: 1,
      gates: defaultGatePlan,
      createdBy: ctx.person.id,
    });
    const inside = workspaceContext({ person: ctx.person, studio: ctx.studio, role: 'lead', workspace });
    await insertStudioEntry(tx, ctx, 'workspace.opened', { workspaceId: workspace.id, name, code });
    await appendEntry(tx, inside, {
      action: 'workspace.opened',
      subjectKind: 'workspace',
      subjectId: workspace.id,
      detail: { name, code, timeZone: workspace.timeZone, studio: ctx.studio.name },
    });
    await appendEntry(tx, inside, {
      action: 'gate-plan.made',
      subjectKind: 'gate-plan',
      subjectId: planId,
      detail: { number: 1, gates: defaultGatePlan },
    });
    return { id: workspace.id, name, slug: workspace.slug, code, timeZone: workspace.timeZone };
  });
}
